import type { ReactNode } from 'react';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import { Chip } from '../base/Chip.tsx';
import { Icon } from '../base/Icon.tsx';
import { bytesText, grouped, lengthText, rateText, timeText } from '../base/numbers.ts';
import { Verdict, type VerdictName } from '../base/Verdict.tsx';

export type Tab = 'trace' | 'wheel' | 'turns' | 'spectrum';

const TABS: readonly (readonly [Tab, string, string])[] = [
  ['trace', 'Trace', ''],
  ['wheel', 'Wheel', '/wheel'],
  ['turns', 'Turns', '/turns'],
  ['spectrum', 'Spectrum', '/spectrum'],
];

const STATES: Record<CaptureJson['status'], readonly [VerdictName, string]> = {
  queued: ['undecided', 'Waiting'],
  reading: ['undecided', 'Reading'],
  measuring: ['undecided', 'Measuring'],
  ready: ['good', 'Ready'],
  failed: ['bad', 'Not read'],
  cancelled: ['info', 'Cancelled'],
};

interface CaptureHeadProps {
  capture: CaptureJson;
  tab: Tab;
  hidden?: ReadonlySet<number>;
  onToggle?: (index: number) => void;
  actions?: ReactNode;
  /** At the right of the tabs. */
  tools?: ReactNode;
}

/** Title block: title, state, chips that hide lanes, actions; the ruled row of cells; the four tabs. */
export function CaptureHead({ capture, tab, hidden, onToggle, actions, tools }: CaptureHeadProps) {
  const [verdict, word] = STATES[capture.status];
  return (
    <header className="capture-head">
      <div className="title-row capture-title">
        <a className="capture-back" href="/captures" aria-label="All captures">
          <Icon name="left" />
        </a>
        <div className="capture-name">
          <h1>{capture.title}</h1>
          <Verdict verdict={verdict} word={word} />
        </div>
        {capture.signals.length > 0 && (
          <div className="capture-chips">
            {capture.signals.map((signal) => (
              <Chip
                key={signal.index}
                circuit={signal.circuit}
                name={signal.name}
                showWiring
                {...(onToggle === undefined
                  ? {}
                  : { shown: !hidden?.has(signal.index), onToggle: () => onToggle(signal.index) })}
              />
            ))}
          </div>
        )}
        {actions !== undefined && <div className="title-actions capture-actions">{actions}</div>}
      </div>
      <dl className="cells capture-cells">
        {cellsOf(capture).map(([label, value, figures]) => (
          <div key={label} className="cell">
            <dt>{label}</dt>
            <dd className={figures ? 'figures' : undefined}>{value}</dd>
          </div>
        ))}
      </dl>
      <div className="capture-tabs">
        <nav className="tabs" aria-label="Ways to look at this capture">
          {TABS.map(([name, label, path]) => (
            <a
              key={name}
              className="tab"
              href={`/captures/${capture.id}${path}`}
              aria-current={name === tab ? 'page' : undefined}
              // The stretch that is shown goes along to the other tabs.
              onClick={(event) => {
                event.currentTarget.search = location.search;
              }}
            >
              {label}
            </a>
          ))}
        </nav>
        {tools}
      </div>
    </header>
  );
}

const DELIMITERS: Record<string, string> = {
  ',': 'comma',
  ';': 'semicolon',
  '\t': 'tab',
  ' ': 'space',
  '|': 'bar',
};

function cellsOf(capture: CaptureJson): [label: string, value: string, figures: boolean][] {
  const { reading, signals, samples } = capture;
  const rate = capture.sampleRateHz === null ? '' : ` at ${rateText(capture.sampleRateHz)}`;
  const changes = capture.axis === 'holds' ? ', changes only' : '';
  const delimiter = reading === null ? '' : `${DELIMITERS[reading.delimiter] ?? reading.delimiter}, `;
  const unit = reading?.timeUnit == null ? '' : `${reading.timeUnit === 'us' ? 'µs' : reading.timeUnit}, `;
  const sha = `sha ${capture.sha256.slice(0, 4)}…${capture.sha256.slice(-4)}`;
  const cells: [string, string, boolean][] = [
    reading?.recordedAt
      ? ['Recorded', reading.recordedAt, true]
      : ['Uploaded', timeText(capture.createdAt), true],
  ];
  if (samples > 0) {
    cells.push(['Samples', `${grouped(samples)} × ${signals.length}${rate}${changes}`, true]);
    cells.push(['Length', lengthText(capture.durationS), true]);
  }
  cells.push(['Original', `${delimiter}${unit}${bytesText(capture.bytes)}, ${sha}`, true]);
  if (reading !== null && reading.rejectedCount > 0)
    cells.push(['Rows with holes', grouped(reading.rejectedCount), true]);
  cells.push(['By', capture.createdBy.name, false]);
  return cells;
}
