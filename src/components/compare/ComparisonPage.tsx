import './compare.css';
import useSWR from 'swr';
import type { ComparisonJson } from '../../contract/areas/library.ts';
import { fetcherWithEtag, sentenceOf } from '../base/api.ts';
import { circuitWords } from '../base/circuits.ts';
import { LineSample } from '../base/LineSample.tsx';
import { Message } from '../base/Message.tsx';
import { timeText } from '../base/numbers.ts';
import { Progress } from '../base/Progress.tsx';
import { Verdict } from '../base/Verdict.tsx';
import { fixed } from '../plot/format.ts';
import { OverlayPlot } from '../plot/OverlayPlot.tsx';
import { Adjust } from './Adjust.tsx';
import { ComparisonTable } from './ComparisonTable.tsx';
import { DifferenceLane } from './DifferenceLane.tsx';

const POLL_MS = 700;
const under = (status: ComparisonJson['status'] | undefined) => status === 'queued' || status === 'running';

/** One comparison: what differs in words, the two traces laid on each other, and the table. */
export function ComparisonPage({ id }: { id: string }) {
  const {
    data: answer,
    error,
    mutate,
  } = useSWR(`/comparisons/${id}`, fetcherWithEtag<ComparisonJson>, {
    refreshInterval: (latest) => (under(latest?.data.status) ? POLL_MS : 0),
    shouldRetryOnError: false,
  });
  const data = answer?.data;
  if (data === undefined)
    return (
      <div className="comparison-state">
        {error === undefined ? (
          <Progress label="Loading the comparison" />
        ) : (
          <Message
            verdict="bad"
            live="alert"
            title="The comparison could not be loaded"
            happened={sentenceOf(error)}
          />
        )}
      </div>
    );
  const again = `/captures/${data.captureId}/compare`;
  // While it is laid anew by hand, what was found before stays in sight.
  if (under(data.status) && data.here === null)
    return (
      <div className="comparison-state" role="status">
        <Progress label="Comparing" />
        <p className="text-soft">You can leave this page and come back to this address.</p>
      </div>
    );
  if (data.status === 'failed' || data.here === null || data.other === null)
    return (
      <div className="comparison-state">
        <Message
          verdict="bad"
          live="alert"
          title="The two could not be compared"
          happened={data.error ?? 'The work stopped without a reason.'}
          kept="Both captures, unchanged."
          todo="Choose another reference."
          actions={
            <>
              <a className="button" href={again}>
                Choose a reference
              </a>
              <button type="button" className="button" onClick={() => void mutate()}>
                Look again
              </button>
            </>
          }
        />
      </div>
    );
  return (
    <Comparison
      comparison={data}
      here={data.here}
      other={data.other}
      again={again}
      etag={answer?.etag ?? null}
      onChanged={() => void mutate()}
    />
  );
}

interface ComparisonProps {
  comparison: ComparisonJson;
  here: NonNullable<ComparisonJson['here']>;
  other: NonNullable<ComparisonJson['other']>;
  again: string;
  etag: string | null;
  onChanged: () => void;
}

function Comparison({ comparison, here, other, again, etag, onChanged }: ComparisonProps) {
  const { overlay, shape, rows, alignment } = comparison;
  const outside = rows.filter((row) => row.verdict === 'outside').length;
  const words = circuitWords(here.circuit);
  const [first = '', ...more] = sentences(comparison.text);
  const parts = shape?.parts ?? [];
  return (
    <div className="comparison">
      <header>
        <div className="title-row capture-title">
          <h1>Compare: {here.name}</h1>
          <span className="chip">
            <LineSample role={words.role} />
            {words.full}
          </span>
          <div className="title-actions">
            <button type="button" className="button" onClick={() => window.print()}>
              Print
            </button>
            <a className="button" href={again}>
              Change reference
            </a>
            <a className="button" href={`/captures/${comparison.captureId}`}>
              To the trace
            </a>
          </div>
        </div>
        <dl className="cells">
          {cellsOf(comparison, here, other).map(([label, value, figures]) => (
            <div key={label} className="cell">
              <dt>{label}</dt>
              <dd className={figures ? 'figures' : undefined}>{value}</dd>
            </div>
          ))}
        </dl>
      </header>
      <section className="comparison-words" aria-label="In words">
        <div>
          <p className="comparison-sentence">{first}</p>
          {more.length > 0 && <p className="text-soft">{more.join(' ')}</p>}
        </div>
        <Verdict
          verdict={outside > 0 ? 'bad' : 'good'}
          word={outside > 0 ? `${outside} of ${rows.length} outside` : `none of ${rows.length} outside`}
        />
      </section>
      {overlay === null ? (
        <div className="comparison-state">
          <Message
            verdict="undecided"
            title="The two traces could not be laid on each other"
            happened="There is no common mark, edge or shape to align them by."
            todo="The table below still compares the values."
          />
        </div>
      ) : (
        <>
          <div className="comparison-plot">
            <OverlayPlot
              axis={overlay.axis}
              data={overlay}
              signal={here}
              parts={parts.filter((part) => part.axis === overlay.axis)}
              summary={`${comparison.text} ${parts.map((part) => part.text).join(' ')}`}
            />
          </div>
          <DifferenceLane overlay={overlay} unit={here.unit} />
          <Legend role={words.role} band={overlay.low !== null} n={other.n} parts={parts.length > 0} />
        </>
      )}
      <p className="comparison-aligned">{alignmentWords(alignment, overlay?.axis ?? null)}</p>
      {(alignment?.notes?.length ?? 0) > 0 && (
        <ul className="comparison-notes" aria-label="What had to be allowed for">
          {alignment?.notes?.map((note) => (
            <li key={note}>{note}</li>
          ))}
        </ul>
      )}
      <div className="comparison-below">
        <ComparisonTable comparison={comparison} />
        <div className="comparison-side">
          {comparison.says !== null && <WhatThisSays says={comparison.says} />}
          {parts.length > 0 && (
            <section>
              <details className="comparison-parts">
                <summary>
                  Where they part: {parts.length} {parts.length === 1 ? 'stretch' : 'stretches'}
                </summary>
                <ul>
                  {parts.map((part) => (
                    <li key={`${part.from} ${part.to}`}>
                      <span className="figures">{partRange(part)}</span> {part.text}
                    </li>
                  ))}
                </ul>
              </details>
            </section>
          )}
          <section aria-label="Alignment by hand">
            <h2>Alignment by hand</h2>
            {comparison.status !== 'ready' && <Progress label="Laying the two anew" />}
            <Adjust comparison={comparison} etag={etag} onChanged={onChanged} />
          </section>
          {(other.members?.length ?? 0) > 0 && (
            <section aria-label="Reference">
              <h2>{other.kind === 'band' ? 'The band is made of' : 'The reference'}</h2>
              <ul className="comparison-members">
                {other.members?.map((member) => (
                  <li key={member.id}>
                    <a href={`/library/${member.id}`}>{member.title}</a>
                    {member.version > 1 && <span className="text-soft">, version {member.version}</span>}
                  </li>
                ))}
              </ul>
            </section>
          )}
        </div>
      </div>
    </div>
  );
}

/** Measured, usually, next, cannot tell: in this order, all four. */
function WhatThisSays({ says }: { says: NonNullable<ComparisonJson['says']> }) {
  return (
    <section aria-label="What this says">
      <h2>What this says</h2>
      <dl className="comparison-says">
        <dt>Measured</dt>
        <dd>{says.measured}</dd>
        <dt>Usually</dt>
        <dd>{says.usually}</dd>
        <dt>Next</dt>
        <dd>{says.next}</dd>
        <dt>Cannot tell</dt>
        <dd>{says.cannotTell}</dd>
      </dl>
    </section>
  );
}

function Legend({ role, band, n, parts }: { role: string; band: boolean; n: number; parts: boolean }) {
  return (
    <ul className={`comparison-legend role-${role}`} aria-label="Legend">
      <li>
        <svg viewBox="0 0 20 8" width="20" height="8" aria-hidden="true">
          <path d="M0 4H20" strokeWidth="2" />
        </svg>
        here
      </li>
      <li>
        <svg viewBox="0 0 20 8" width="20" height="8" aria-hidden="true">
          {band && <rect width="20" height="8" className="legend-band" />}
          <path d="M0 4H20" strokeDasharray="4 2" />
        </svg>
        {band ? `band of ${n}, lowest to highest` : 'reference'}
      </li>
      {parts && (
        <li>
          <i className="legend-parts" />
          where they part
        </li>
      )}
    </ul>
  );
}

function cellsOf(
  comparison: ComparisonJson,
  here: ComparisonProps['here'],
  other: ComparisonProps['other'],
): [string, string, boolean][] {
  const kind = { knownGood: 'Known-good', capture: 'Capture', band: 'Band' }[other.kind];
  return [
    ['Here', here.title, false],
    [kind, other.title, false],
    ['Aligned by', comparison.alignment?.by ?? 'none', false],
    ...(comparison.alignment?.shiftS == null
      ? []
      : ([['Shift', `${fixed(comparison.alignment.shiftS, 4)} s`, true]] as [string, string, boolean][])),
    ['Measured with', `engine ${comparison.engine ?? ''}`, true],
    ['Compared', timeText(comparison.createdAt), true],
  ];
}

function alignmentWords(alignment: ComparisonJson['alignment'], axis: 'deg' | 's' | null): string {
  if (alignment === null || alignment.by === 'none')
    return 'They could not be laid on each other: both are drawn from their own beginning.';
  const sure =
    alignment.confidence >= 0.85
      ? 'sure'
      : alignment.confidence >= 0.6
        ? 'fairly sure'
        : 'with little certainty: look at the overlay first';
  const over = axis === 'deg' ? ' Both are drawn over crank degrees, so speed does not matter.' : '';
  const by = {
    'reference mark': 'the gap',
    'switch-off': 'the switch-off',
    edge: 'the first edge',
    correlation: 'their shape',
  }[alignment.by];
  const hand =
    alignment.byHand == null
      ? ''
      : ` Moved by hand: the reference ${alignment.byHand.axis === 'deg' ? `${fixed(alignment.byHand.shift, 1)}°` : `${fixed(alignment.byHand.shift * 1e3, 3)} ms`} later.`;
  return `Aligned at ${by}, ${sure}.${over}${hand}`;
}

type Part = NonNullable<ComparisonJson['shape']>['parts'][number];

function partRange({ from, to, axis }: Part): string {
  return axis === 'deg'
    ? `${fixed(from, 0)}° to ${fixed(to, 0)}°`
    : `${fixed(from * 1e3, 2)} to ${fixed(to * 1e3, 2)} ms`;
}

/** A text as its sentences; a full stop inside a number is none. */
const sentences = (text: string) => text.split(/(?<=[.!?])\s+(?=\p{Lu})/u).filter((part) => part !== '');
