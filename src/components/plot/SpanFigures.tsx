import { useEffect, useState } from 'react';
import type { DecodedWindow } from './decode-window.ts';
import { degreesAt } from './degrees.ts';
import { count, digitsFor, duration, fixed, frequency, time, withUnit } from './format.ts';
import type { Lane } from './lanes.ts';
import type { PlotModel } from './model.ts';
import { nearestEdge, nearestPeak, nearestTooth, type SnapTo } from './snap.ts';
import { spanStatistics } from './span-statistics.ts';
import type { PlotWheel, View } from './types.ts';
import { useStore } from './useStore.ts';
import { MOST_COLUMNS } from './window-cache.ts';

interface SpanFiguresProps {
  model: PlotModel;
  lanes: readonly Lane[];
  wheel: PlotWheel | null;
}

/** What lies between the two handles: length, frequency, angle, and each lane's figures; handles put on what is near. */
export function SpanFigures({ model, lanes, wheel }: SpanFiguresProps) {
  const span = useStore(model.span);
  const view = useStore(model.view);
  useStore(model.loader.state);
  const own = useOwnWindow(model, span);
  const [word, setWord] = useState('');
  if (span === null) return null;
  const length = span.to - span.from;
  const covered = model.loader.best(covering(view, span), model.devicePixels());
  const window = own ?? covered;
  const angle = angleOf(wheel, span);
  const fine = view.to - view.from;

  const snap = async (to: SnapTo) => {
    setWord('');
    const lane = lanes[0];
    if (lane === undefined) return;
    const put = async (at: number): Promise<number | null> => {
      if (to === 'tooth') return wheel === null ? null : nearestTooth(wheel, at);
      const reach = fine / 4;
      const near = await model.fetchWindow(
        { from: at - reach, to: at + reach, columns: MOST_COLUMNS },
        new AbortController().signal,
      );
      if (near.layout !== 'samples') return null;
      return (to === 'edge' ? nearestEdge : nearestPeak)(near, lane.signal.index, at);
    };
    try {
      const [from, end] = await Promise.all([put(span.from), put(span.to)]);
      if (from === null && end === null) {
        setWord(`No ${to} of ${lane.signal.name} close by. Zoom in and try again.`);
        return;
      }
      const [a, b] = [from ?? span.from, end ?? span.to];
      model.span.set({ from: Math.min(a, b), to: Math.max(a, b) });
    } catch {
      setWord('The samples could not be had. Try again.');
    }
  };

  return (
    <section className="plot-figures" aria-label="Span">
      <div className="figures-line">
        <b>Span</b> <span className="figures">{duration(length)}</span>
        {length > 0 && <span className="figures">{frequency(1 / length)}</span>}
        {angle !== null && <span className="figures">{fixed(angle, 1)}°</span>}
        <span className="text-soft figures">
          {time(span.from, fine)} to {time(span.to, fine)}
        </span>
        <span className="figures-snap">
          <span className="text-soft">Put on</span>
          <button type="button" className="button button-quiet" onClick={() => void snap('edge')}>
            edges
          </button>
          <button type="button" className="button button-quiet" onClick={() => void snap('peak')}>
            peaks
          </button>
          {wheel !== null && (
            <button type="button" className="button button-quiet" onClick={() => void snap('tooth')}>
              teeth
            </button>
          )}
        </span>
        <span role="status" className="text-soft">
          {word}
        </span>
      </div>
      {window !== null &&
        lanes.map((lane) => <LaneFigures key={lane.signal.index} lane={lane} window={window} span={span} />)}
    </section>
  );
}

function LaneFigures({ lane, window, span }: { lane: Lane; window: DecodedWindow; span: View }) {
  const { unit, name } = lane.signal;
  const figures = spanStatistics(window, lane.signal, span.from, span.to);
  const text = (value: number) => withUnit(fixed(value, digitsFor((lane.high - lane.low) / 2000)), unit);
  const length = span.to - span.from;
  const slope = figures.difference === null || length === 0 ? null : figures.difference / length;
  const rows: [string, string | null][] = [
    ['start', figures.atStart === null ? null : text(figures.atStart)],
    ['end', figures.atEnd === null ? null : text(figures.atEnd)],
    ['difference', figures.difference === null ? null : text(figures.difference)],
    ['slope', slope === null || unit === '1' ? null : slopeText(slope, unit)],
    ['mean', figures.mean === null ? null : text(figures.mean)],
    ['lowest', figures.lowest === null ? null : text(figures.lowest)],
    ['highest', figures.highest === null ? null : text(figures.highest)],
    ['samples', figures.n === null ? null : count(figures.n)],
  ];
  return (
    <dl className="figures-lane" aria-label={name}>
      <div>
        <dt className="figures-name">{name}</dt>
        {figures.lowest === null && <dd>no sample</dd>}
      </div>
      {rows.map(
        ([label, value]) =>
          value !== null && (
            <div key={label}>
              <dt>{label}</dt>
              <dd className="figures">{value}</dd>
            </div>
          ),
      )}
      {figures.n === null && figures.lowest !== null && (
        <div>
          <dt>mean and ends</dt>
          <dd>zoom in: too many samples to fetch</dd>
        </div>
      )}
    </dl>
  );
}

const RESTED_MS = 250;

/** The samples of the span itself, asked for once it rests: exact where the view shows columns only. */
function useOwnWindow(model: PlotModel, span: View | null): DecodedWindow | null {
  const [own, setOwn] = useState<{ readonly span: View; readonly window: DecodedWindow } | null>(null);
  useEffect(() => {
    if (span === null) return;
    const abort = new AbortController();
    const timer = setTimeout(() => {
      const at = model.loader.best(covering(model.view.get(), span), model.devicePixels());
      if (at?.layout === 'samples' && at.from <= span.from && at.to >= span.to) return;
      model.fetchWindow({ ...span, columns: MOST_COLUMNS }, abort.signal).then(
        (window) => setOwn({ span, window }),
        () => {},
      );
    }, RESTED_MS);
    return () => {
      clearTimeout(timer);
      abort.abort();
    };
  }, [model, span]);
  return own !== null && own.span === span && own.window.layout === 'samples' ? own.window : null;
}

const covering = (view: View, span: View): View => ({
  from: Math.min(view.from, span.from),
  to: Math.max(view.to, span.to),
});

function slopeText(perSecond: number, unit: string): string {
  const perMs = perSecond / 1000;
  return Math.abs(perMs) >= 0.1
    ? `${fixed(perMs, digitsFor(Math.abs(perMs) / 1000))} ${unit}/ms`
    : `${fixed(perSecond, digitsFor(Math.abs(perSecond) / 1000))} ${unit}/s`;
}

function angleOf(wheel: PlotWheel | null, span: View): number | null {
  if (wheel === null) return null;
  const from = degreesAt(wheel, span.from);
  const to = degreesAt(wheel, span.to);
  return from === null || to === null ? null : to - from;
}
