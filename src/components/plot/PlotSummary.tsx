import { useEffect, useState } from 'react';
import { digitsFor, fixed, time, withUnit } from './format.ts';
import type { Lane } from './lanes.ts';
import { extentOf } from './line-data.ts';
import type { PlotModel } from './model.ts';
import { stepInView } from './steps.ts';

/** Words and a table of what the view shows, for those who cannot see it. Follows the view once it rests. */
export function PlotSummary({ id, model, lanes }: { id: string; model: PlotModel; lanes: readonly Lane[] }) {
  const view = useRested(model);
  const { whole } = model.bounds;
  const span = view.to - view.from;
  const window = model.loader.best(view, model.devicePixels());
  const step = stepInView(model);
  const steps = model.steps.get();
  return (
    <div className="sr-only">
      <p id={id}>
        {lanes.length === 1 ? 'One signal' : `${lanes.length} signals`} over{' '}
        {time(whole.to - whole.from, span)}. Shown: {time(view.from, span)} to {time(view.to, span)}
        {steps !== null &&
          step !== null &&
          `, ${steps.word.toLowerCase()} ${step + 1} of ${steps.stretches.length}`}
        . Press ? for the keys.
      </p>
      <p role="status">
        {steps !== null && step !== null && `${steps.word} ${step + 1} of ${steps.stretches.length}`}
      </p>
      <table>
        <caption>Values in view</caption>
        <thead>
          <tr>
            <th scope="col">Signal</th>
            <th scope="col">Lowest</th>
            <th scope="col">Highest</th>
          </tr>
        </thead>
        <tbody>
          {lanes.map((lane) => {
            const extent = window === null ? null : extentOf(window, lane.signal, view.from, view.to);
            const text = (value: number | undefined) =>
              value === undefined
                ? 'no sample'
                : withUnit(fixed(value, digitsFor((lane.high - lane.low) / 1000)), lane.signal.unit);
            return (
              <tr key={lane.signal.index}>
                <th scope="row">{lane.signal.name}</th>
                <td>{text(extent?.lowest)}</td>
                <td>{text(extent?.highest)}</td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}

const REST_MS = 400;

function useRested(model: PlotModel) {
  const [view, setView] = useState(model.view.get());
  useEffect(() => {
    let timer = 0;
    const later = () => {
      globalThis.clearTimeout(timer);
      timer = globalThis.setTimeout(() => setView({ ...model.view.get() }), REST_MS) as unknown as number;
    };
    const stops = [model.view.subscribe(later), model.loader.state.subscribe(later)];
    return () => {
      globalThis.clearTimeout(timer);
      for (const stop of stops) stop();
    };
  }, [model]);
  return view;
}
