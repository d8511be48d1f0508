import { degreesAt, turnAt } from './degrees.ts';
import { digitsFor, fixed, time, withUnit } from './format.ts';
import { type Lane, stackHeight } from './lanes.ts';
import type { PlotModel } from './model.ts';
import { valueUnder } from './span-statistics.ts';
import type { PlotWheel } from './types.ts';
import { useStore } from './useStore.ts';
import { shareOfTime } from './view.ts';

interface CursorProps {
  model: PlotModel;
  lanes: readonly Lane[];
  wheel: PlotWheel | null;
  width: number;
}

/** The cursor line with time, angle and each lane's value under it. Moving it draws no trace. */
export function Cursor({ model, lanes, wheel, width }: CursorProps) {
  const at = useStore(model.cursorS);
  const view = useStore(model.view);
  const loaded = useStore(model.loader.state);
  if (at === null || at < view.from || at > view.to || width === 0) return null;
  const x = shareOfTime(view, at) * width;
  const side = x > width - 130 ? 'left' : 'right';
  const window = model.loader.best(view, model.devicePixels());
  const degrees = wheel === null ? null : degreesAt(wheel, at);
  const turn = wheel === null ? null : turnAt(wheel, at);
  return (
    <div
      className="plot-cursor"
      style={{ transform: `translateX(${x}px)`, height: stackHeight(lanes) }}
      aria-hidden="true"
    >
      <div className={`plot-cursor-tag plot-cursor-${side}`}>
        {time(at, view.to - view.from)}
        {degrees !== null && <b> {fixed(((degrees % 360) + 360) % 360, 1)}°</b>}
        {turn !== null && ` turn ${turn + 1}`}
      </div>
      {window !== null &&
        loaded.cache.overview !== null &&
        lanes.map((lane) => {
          const under = valueUnder(window, lane.signal, at);
          return (
            <div
              key={lane.signal.index}
              className={`plot-cursor-value plot-cursor-${side}`}
              style={{ top: lane.top + lane.height - 26 }}
            >
              {under === null ? 'no sample' : valueText(under, lane)}
            </div>
          );
        })}
    </div>
  );
}

/** One sample's value, or lowest to highest where many samples share the pixel. */
function valueText({ lowest, highest }: { lowest: number; highest: number }, lane: Lane): string {
  const digits = digitsFor((lane.high - lane.low) / 1000);
  const low = fixed(lowest, digits);
  const high = fixed(highest, digits);
  return withUnit(low === high ? low : `${low} to ${high}`, lane.signal.unit);
}
