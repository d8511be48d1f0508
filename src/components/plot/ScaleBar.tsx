import { Mark } from '../base/Mark.tsx';
import { degreeScale } from './degree-scale.ts';
import { fixed } from './format.ts';
import type { PlotModel } from './model.ts';
import type { Steps } from './steps.ts';
import { timeScale } from './time-scale.ts';
import type { PlotWheel, View } from './types.ts';
import { useStore } from './useStore.ts';
import { shareOfTime } from './view.ts';

export type ScaleKind = 'seconds' | 'degrees';

interface ScaleBarProps {
  model: PlotModel;
  wheel: PlotWheel | null;
  kind: ScaleKind;
  narrow: boolean;
}

/** The scale above the lanes: seconds, or crank degrees and tooth numbers where a wheel is known. */
export function ScaleBar({ model, wheel, kind, narrow }: ScaleBarProps) {
  const view = useStore(model.view);
  const width = useStore(model.widthPx);
  const steps = useStore(model.steps);
  if (width === 0) return <div className="plot-scale" />;
  const degrees = kind === 'degrees' && wheel !== null ? degreeScale(wheel, view, width) : null;
  const barY = narrow ? 22 : 44;
  const origin = degrees === null ? originIn(steps, view) : null;
  const times = timeScale(view, width, origin ?? 0);
  const scale = degrees ?? times;
  const box = (dark: boolean) =>
    scale.fields
      .filter((field) => field.dark === dark)
      .map(({ from, to }) => `M${from.toFixed(1)} ${barY}H${to.toFixed(1)}v7H${from.toFixed(1)}z`)
      .join('');
  const labels = degrees ? degrees.degrees : times.labels;
  // On a phone nothing stands left of the lanes: a label at the edge would be cut.
  const edge = (at: number, text: string) => (narrow ? Math.max(at, text.length * 3.6) : at);
  const ticks = degrees ? degrees.teeth : times.ticks;
  return (
    <div className="plot-scale" aria-hidden="true">
      {!narrow && <span className="plot-scale-name">{degrees ? 'crank' : 'time'}</span>}
      {!narrow && degrees && <span className="plot-scale-name plot-scale-tooth">tooth</span>}
      <svg aria-hidden="true" className="plot-scale-svg" width={width} height={narrow ? 52 : 76}>
        {!narrow && degrees && <Turns scale={degrees} />}
        {!narrow && origin !== null && (
          <text
            className="plot-label plot-label-mark"
            x={shareOfTime(view, origin) * width}
            y={20}
            textAnchor="middle"
          >
            switch-off
          </text>
        )}
        <path className="plot-field" d={box(false)} />
        <path className="plot-field plot-field-dark" d={box(true)} />
        <path
          className="plot-tick"
          d={[
            ...ticks.map((at) => `M${at.toFixed(1)} ${barY + 7}v4`),
            ...labels.map(({ at }) => `M${at.toFixed(1)} ${barY - 4}v4`),
          ].join('')}
        />
        {labels.map(({ at, text }) => (
          <text
            key={`${text}${at.toFixed(0)}`}
            className="plot-label"
            x={edge(at, text)}
            y={barY - 8}
            textAnchor="middle"
          >
            {text}
          </text>
        ))}
        {degrees?.toothNumbers.map(({ at, tooth }) => (
          <text
            key={at}
            className={tooth === 1 ? 'plot-label plot-label-mark' : 'plot-label plot-label-soft'}
            x={at}
            y={barY + 24}
            textAnchor="middle"
          >
            {tooth}
          </text>
        ))}
      </svg>
    </div>
  );
}

/** Time is told from the moment of the one step in view; null where several are in view or a step has none. */
function originIn(steps: Steps | null, view: View): number | null {
  const inView = steps?.originsS?.filter((origin) => origin > view.from && origin < view.to) ?? [];
  return inView.length === 1 ? inView[0]! : null;
}

function Turns({ scale }: { scale: NonNullable<ReturnType<typeof degreeScale>> }) {
  return (
    <g>
      {scale.turns.map(({ from, to, turn, rpm }) => {
        const wide = to - from;
        if (wide < 64) return null;
        const middle = (from + to) / 2;
        const half = wide > 150 ? 62 : 30;
        const line = wide / 2 - half - 14;
        return (
          <g key={turn}>
            {line > 8 && (
              <path className="plot-turn-line" d={`M${from + 14} 10h${line}M${to - 14} 10h${-line}`} />
            )}
            <text className="plot-turn" x={middle} y={14} textAnchor="middle">
              Turn {turn + 1}
              {wide > 150 && (
                <tspan className="plot-turn-speed" dx="8">
                  {fixed(rpm, 1)} rpm
                </tspan>
              )}
            </text>
          </g>
        );
      })}
      {scale.marks.map(({ at, timeS }, place) => {
        const before = scale.marks[place - 1];
        if (before !== undefined && at - before.at < 40) return null;
        return (
          <g key={timeS} className="plot-mark-sign" transform={`translate(${at - 8} 2)`}>
            <Mark size={16} />
          </g>
        );
      })}
    </g>
  );
}
