import { circuitWords } from '../base/circuits.ts';
import { LineSample } from '../base/LineSample.tsx';
import { digitsFor, fixed, unitText } from './format.ts';
import { type Lane, yOf } from './lanes.ts';
import { valueTicks } from './ticks.ts';

/** Names and value ticks outside the lanes; on a phone the ticks stand at the right and the names inside. */
export function Gutter({ lanes, narrow }: { lanes: readonly Lane[]; narrow: boolean }) {
  return (
    <>
      {lanes.map((lane) => {
        const words = circuitWords(lane.signal.circuit);
        const { ticks, step } = valueTicks(lane.low, lane.high, lane.height < 130 ? 2 : 3);
        const unit = unitText(lane.signal.unit);
        return (
          <div
            key={lane.signal.index}
            className="plot-gutter-lane"
            style={{ top: lane.top, height: lane.height }}
          >
            <div className="plot-name">
              <LineSample role={words.role} />
              <b>{lane.signal.name}</b>
              {!narrow && words.wiring !== null && <span>{words.wiring}</span>}
            </div>
            <div aria-hidden="true">
              {ticks.map((tick) => (
                <span key={tick} className="plot-volt" style={{ top: yOf(lane, tick) - lane.top }}>
                  {large(tick) ? tick.toExponential(0) : fixed(tick, digitsFor(step))}
                  {unit === '' ? '' : ` ${unit}`}
                </span>
              ))}
            </div>
          </div>
        );
      })}
    </>
  );
}

const large = (value: number) => Math.abs(value) >= 1e6;
