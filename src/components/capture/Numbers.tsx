import { useState } from 'react';
import type { CaptureJson, MeasurementsJson } from '../../contract/areas/captures.ts';
import type { Notice, Value } from '../../engine/value.ts';
import { circuitWords } from '../base/circuits.ts';
import { LineSample } from '../base/LineSample.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { Verdict } from '../base/Verdict.tsx';
import type { PlotWheel } from '../plot/types.ts';
import { Notices } from './Notices.tsx';
import { type NumberRow, numberRows } from './number-rows.ts';

/** A number or notice that was chosen: its samples are shown and hatched. */
export interface Chosen {
  readonly id: string;
  readonly label: string;
  readonly text: string;
  readonly signal: number | null;
  readonly evidence: Value['evidence'];
}

interface Group {
  readonly id: string;
  readonly name: string;
  readonly circuits: readonly string[];
  readonly wiring: string | null;
  readonly signal: number | null;
  readonly rows: readonly NumberRow[];
  readonly notices: readonly Notice[];
}

interface NumbersProps {
  capture: CaptureJson;
  measurements: MeasurementsJson;
  wheel: PlotWheel | null;
  chosen: string | null;
  onChoose: (chosen: Chosen | null) => void;
}

/** Every measured value with unit, count and spread; choosing one shows the samples behind it. */
export function Numbers({ capture, measurements, wheel, chosen, onChoose }: NumbersProps) {
  const [only, setOnly] = useState('all');
  const groups = groupsOf(capture, measurements, wheel);
  const count = groups.reduce((sum, group) => sum + group.rows.length, 0);
  const shown = only === 'all' ? groups : groups.filter((group) => group.id === only);
  return (
    <section className="numbers" aria-labelledby="numbers-title">
      <div className="numbers-head">
        <h2 id="numbers-title">Numbers</h2>
        <span className="text-soft">
          {count} <span className="numbers-word">{count === 1 ? 'value' : 'values'}</span>
          {measurements.stale && ', being measured again'}
        </span>
        {groups.length > 1 && capture.signals.length < 3 && (
          <div className="numbers-only">
            <Segmented
              label="Whose numbers"
              value={only}
              onChange={setOnly}
              options={[
                ...groups.map((group) => ({
                  value: group.id,
                  text: group.signal === null ? 'Both' : group.name,
                })),
                { value: 'all', text: 'All' },
              ]}
            />
          </div>
        )}
      </div>
      {shown.map((group) => (
        <div key={group.id}>
          <h3 className="numbers-signal">
            {group.circuits.map((circuit, place) => (
              // biome-ignore lint/suspicious/noArrayIndexKey: two signals may be of one circuit
              <LineSample key={place} role={circuitWords(circuit).role} />
            ))}
            <b>{group.name}</b>
            {group.wiring !== null && <span>{group.wiring}</span>}
          </h3>
          <Notices
            notices={group.notices}
            onShow={(notice) =>
              onChoose({
                id: `${group.id} ${notice.code}`,
                label: 'What the note speaks of',
                text: '',
                signal: group.signal,
                evidence: notice.evidence,
              })
            }
          />
          <ul>
            {group.rows.map((row) => (
              <Row key={row.id} row={row} group={group} chosen={chosen} onChoose={onChoose} />
            ))}
          </ul>
        </div>
      ))}
    </section>
  );
}

interface RowProps {
  row: NumberRow;
  group: Group;
  chosen: string | null;
  onChoose: NumbersProps['onChoose'];
}

function Row({ row, group, chosen, onChoose }: RowProps) {
  const id = `${group.id} ${row.id}`;
  const isChosen = chosen === id;
  const content = (
    <>
      <span className="number-label">
        {row.label}
        {row.look && <Verdict verdict="watch" word="look" />}
      </span>
      <span className="number-value">
        {row.text ?? 'none'}
        {row.unit !== '' && (
          <span className={row.unit === '°' ? undefined : 'unit'}>
            {row.unit === '°' ? '°' : ` ${row.unit}`}
          </span>
        )}
      </span>
      {row.detail !== '' && <span className="number-detail">{row.detail}</span>}
    </>
  );
  if (row.evidence.length === 0) return <li className="number number-still">{content}</li>;
  return (
    <li>
      <button
        type="button"
        className="number"
        aria-pressed={isChosen}
        onClick={() =>
          onChoose(
            isChosen
              ? null
              : {
                  id,
                  label: row.label,
                  text:
                    row.text === null
                      ? ''
                      : `${row.text}${row.unit === '°' ? '°' : row.unit === '' ? '' : ` ${row.unit}`}`,
                  signal: group.signal,
                  evidence: row.evidence,
                },
          )
        }
      >
        {content}
      </button>
    </li>
  );
}

function groupsOf(capture: CaptureJson, measurements: MeasurementsJson, wheel: PlotWheel | null): Group[] {
  const nameOf = (index: number) =>
    capture.signals.find((signal) => signal.index === index)?.name ?? `Signal ${index + 1}`;
  const circuitOf = (index: number) =>
    capture.signals.find((signal) => signal.index === index)?.circuit ?? 'other';
  return [
    ...measurements.signals.map((signal) => ({
      id: `s${signal.index}`,
      name: nameOf(signal.index),
      circuits: [signal.circuit],
      wiring: circuitWords(signal.circuit).wiring,
      signal: signal.index,
      rows: signal.values.flatMap((value) => numberRows(value, wheel)),
      notices: signal.notices,
    })),
    ...measurements.relations.map((relation) => ({
      id: `r${relation.signals.join('-')}`,
      name: relation.signals.map(nameOf).join(' and '),
      circuits: relation.signals.map(circuitOf),
      wiring: 'together',
      signal: null,
      rows: relation.values.flatMap((value) => numberRows(value, wheel)),
      notices: relation.notices,
    })),
  ].filter((group) => group.rows.length > 0 || group.notices.length > 0);
}
