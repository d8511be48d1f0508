import '../capture/capture.css';
import '../plot/plot.css';
import './turns.css';
import { useCallback, useMemo, useState } from 'react';
import type { CaptureJson, MeasurementsJson } from '../../contract/areas/captures.ts';
import { sentenceOf } from '../base/api.ts';
import { Message } from '../base/Message.tsx';
import { Verdict } from '../base/Verdict.tsx';
import { CaptureActions } from '../capture/CaptureActions.tsx';
import { CaptureHead } from '../capture/CaptureHead.tsx';
import { CaptureGone, CaptureSkeleton, CaptureState } from '../capture/CaptureState.tsx';
import { type NumberRow, numberRows } from '../capture/number-rows.ts';
import { stepsOf } from '../capture/steps-of.ts';
import { useCapture, useFindings } from '../capture/use-capture.ts';
import { degreesAt } from '../plot/degrees.ts';
import type { PlotWheel, View } from '../plot/types.ts';
import { degreeRows, type Rows, timeRows } from './rows-of.ts';
import { TurnRows } from './TurnRows.tsx';
import { type Laid, type RowKind, TurnsTools } from './TurnsTools.tsx';
import { useRowWindows } from './useRowWindows.ts';

/** So many rows stand at a time; the rest is gone through. */
const ROWS_AT_A_TIME = 60;

/** The capture's third tab: turns, cycles, firings or pulses under each other. */
export function CaptureTurns({ id }: { id: string }) {
  const loaded = useCapture(id);
  const capture = loaded.data?.data;
  const { measurements, wheel } = useFindings(id, capture);
  if (capture === undefined)
    return loaded.error === undefined ? <CaptureSkeleton /> : <CaptureGone error={loaded.error} />;
  const ready = capture.status === 'ready';
  const error = measurements.error ?? wheel.error;
  const there = ready && measurements.data !== undefined && wheel.data !== undefined;
  return (
    <div className="capture-flow">
      {!there && <CaptureHead capture={capture} tab="turns" actions={<CaptureActions capture={capture} />} />}
      {!ready && <CaptureState capture={capture} onChange={() => void loaded.mutate()} />}
      {ready && error !== undefined && (
        <div className="capture-state">
          <Message
            verdict="bad"
            live="alert"
            title="The turns could not be loaded"
            happened={sentenceOf(error)}
          />
        </div>
      )}
      {ready && error === undefined && !there && <CaptureSkeleton />}
      {there && <Turns capture={capture} measurements={measurements.data!} wheel={wheel.data ?? null} />}
    </div>
  );
}

interface TurnsProps {
  capture: CaptureJson;
  measurements: MeasurementsJson;
  wheel: PlotWheel | null;
}

function Turns({ capture, measurements, wheel }: TurnsProps) {
  const steps = useMemo(() => stepsOf(wheel, measurements), [wheel, measurements]);
  const kinds = useMemo<RowKind[]>(() => {
    const turns = (wheel?.marksS.length ?? 1) - 1;
    return [
      ...(turns >= 1 ? (['360'] as const) : []),
      ...(turns >= 2 ? (['720'] as const) : []),
      ...steps.map(({ word }) => word),
    ];
  }, [wheel, steps]);
  const [chosenKind, setKind] = useState<RowKind | null>(null);
  const [laid, setLaid] = useState<Laid>('rows');
  const [signal, setSignal] = useState(capture.signals[0]?.index ?? 0);
  const [column, setColumn] = useState<View | null>(null);
  const [chosen, setChosen] = useState<string | null>(null);
  const [page, setPage] = useState(0);
  const [width, setWidth] = useState(0);
  const kind = chosenKind ?? kinds[0];

  const all = useMemo<Rows | null>(() => {
    if (kind === undefined) return null;
    if (kind === '360' || kind === '720')
      return wheel === null ? null : degreeRows(wheel, kind === '360' ? 360 : 720);
    const step = steps.find(({ word }) => word === kind);
    return step === undefined ? null : timeRows(step);
  }, [kind, wheel, steps]);
  const shownRows = useMemo(
    () =>
      all === null
        ? null
        : { ...all, rows: all.rows.slice(page * ROWS_AT_A_TIME, (page + 1) * ROWS_AT_A_TIME) },
    [all, page],
  );
  // A column a pixel; on a grid, so that a changed width asks for little anew.
  const columns = Math.min(Math.ceil(width / 128) * 128, 2048);
  const { windows, trouble } = useRowWindows(
    capture.id,
    capture.samplesVersion,
    shownRows?.rows ?? NO_ROWS,
    columns,
  );
  const shown = useMemo(
    () =>
      laid === 'shade'
        ? [signal]
        : [signal, ...capture.signals.map(({ index }) => index).filter((index) => index !== signal)].slice(
            0,
            4,
          ),
    [capture, signal, laid],
  );
  const point = useCallback((next: View | null) => {
    setChosen(null);
    setColumn(next);
  }, []);
  const numbers = useMemo(() => repeating(measurements, wheel), [measurements, wheel]);

  const tools = kind !== undefined && (
    <TurnsTools
      laid={laid}
      onLaid={setLaid}
      kinds={kinds}
      kind={kind}
      onKind={(next) => {
        setKind(next);
        setPage(0);
        point(null);
      }}
      signals={capture.signals}
      signal={signal}
      onSignal={setSignal}
    />
  );
  const pages = Math.ceil((all?.rows.length ?? 0) / ROWS_AT_A_TIME);
  return (
    <>
      <CaptureHead
        capture={capture}
        tab="turns"
        actions={<CaptureActions capture={capture} />}
        tools={tools}
      />
      {shownRows === null || all === null ? (
        <div className="capture-state">
          <Message
            verdict="info"
            title="Nothing in this capture repeats that could be laid under each other"
            happened="It holds no complete turn of a wheel, no firing and no pulse that could be told apart."
            todo="Record two turns or more of the crank signal, or several firings, while cranking."
            actions={
              <a className="button" href={`/captures/${capture.id}`}>
                To the trace
              </a>
            }
          />
        </div>
      ) : (
        <div className="turns-body">
          <section className="turns-main" aria-label="Rows">
            {trouble !== null && (
              <p className="turns-trouble" role="status">
                {trouble}
              </p>
            )}
            <TurnRows
              captureId={capture.id}
              capture={capture}
              rows={shownRows}
              windows={windows}
              wheel={wheel}
              laid={laid}
              shown={shown}
              column={column}
              onColumn={point}
              onWidth={setWidth}
            />
            {pages > 1 && (
              <p className="turns-pages">
                <button
                  type="button"
                  className="button"
                  disabled={page === 0}
                  onClick={() => setPage(page - 1)}
                >
                  Earlier rows
                </button>
                <span className="figures">
                  {page * ROWS_AT_A_TIME + 1} to {Math.min((page + 1) * ROWS_AT_A_TIME, all.rows.length)} of{' '}
                  {all.rows.length}
                </span>
                <button
                  type="button"
                  className="button"
                  disabled={page >= pages - 1}
                  onClick={() => setPage(page + 1)}
                >
                  Later rows
                </button>
              </p>
            )}
          </section>
          <aside className="turns-side" aria-label="What repeats">
            <div className="numbers-head">
              <h2>What repeats</h2>
              <span className="text-soft">{all.axis === 'deg' ? 'at one angle' : 'in every row'}</span>
            </div>
            {numbers.length === 0 && (
              <p className="turns-none text-soft">
                Point at the rows: the column and the values in it stand beside each row.
              </p>
            )}
            <ul>
              {numbers.map((row) => {
                const target = all.axis === 'deg' ? columnOf(row, wheel, all.across.to) : null;
                return (
                  <li key={row.id}>
                    <button
                      type="button"
                      className="number"
                      aria-pressed={chosen === row.id}
                      disabled={target === null}
                      onClick={() => {
                        setChosen(chosen === row.id ? null : row.id);
                        setColumn(chosen === row.id ? null : target);
                      }}
                    >
                      <span className="number-label">
                        {row.label}
                        {row.look && <Verdict verdict="watch" word="look" />}
                      </span>
                      <span className="number-value">
                        {row.text ?? 'none'}
                        {row.unit !== '' && (
                          <span className="unit">{row.unit === '°' ? '°' : ` ${row.unit}`}</span>
                        )}
                      </span>
                      {row.detail !== '' && <span className="number-detail">{row.detail}</span>}
                    </button>
                  </li>
                );
              })}
            </ul>
            <p className="turns-none text-soft">
              What keeps its angle from turn to turn usually sits on the wheel or the crank; what wanders
              usually sits in wiring or supply. A row leads to its samples.
            </p>
          </aside>
        </div>
      )}
    </>
  );
}

const NO_ROWS: Rows['rows'] = [];
const KEYS = new Set([
  'irregular_teeth',
  'gap_ratio',
  'rpm_mean',
  'rpm_instant',
  'speed_ripple',
  'compression_balance',
  'cam_rising_angles',
  'cam_falling_angles',
  'firing_interval',
  'dwell',
  'kick_peak',
  'burn_time',
  'pulse_width',
]);

/** What is measured once a turn, tooth, cycle or event. */
function repeating(measurements: MeasurementsJson, wheel: PlotWheel | null): NumberRow[] {
  return [...measurements.signals, ...measurements.relations].flatMap(({ values }, place) =>
    values
      .filter(({ key, value }) => KEYS.has(key) && value !== null)
      .flatMap((value) => numberRows(value, wheel))
      .map((row) => ({ ...row, id: `${place} ${row.id}` })),
  );
}

/** Where across the rows a number's samples lie; null where they are spread over a whole turn. */
function columnOf(row: NumberRow, wheel: PlotWheel | null, acrossDeg: number): View | null {
  const [evidence] = row.evidence;
  if (evidence === undefined || wheel === null) return null;
  const from = degreesAt(wheel, evidence.from);
  const to = degreesAt(wheel, evidence.to);
  if (from === null || to === null || to - from > 120) return null;
  const start = ((from % acrossDeg) + acrossDeg) % acrossDeg;
  return { from: start, to: Math.min(start + to - from, acrossDeg) };
}
