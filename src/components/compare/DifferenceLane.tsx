import type { ComparisonJson } from '../../contract/areas/library.ts';
import { digitsFor, fixed } from '../plot/format.ts';

const WIDTH = 1200;
const HEIGHT = 56;

/** Here less the reference over the same axis: a straight line where the two agree. */
export function DifferenceLane({
  overlay,
  unit,
}: {
  overlay: NonNullable<ComparisonJson['overlay']>;
  unit: string;
}) {
  const values = overlay.difference ?? [];
  const most = values.reduce<number>((high, value) => Math.max(high, Math.abs(value ?? 0)), 0);
  if (values.length === 0 || most === 0) return null;
  const step = WIDTH / Math.max(values.length - 1, 1);
  let path = '';
  let pen = false;
  values.forEach((value, i) => {
    if (value === null) {
      pen = false;
      return;
    }
    path += `${pen ? 'L' : 'M'}${(i * step).toFixed(1)} ${(HEIGHT / 2 - (value / most) * (HEIGHT / 2 - 3)).toFixed(1)}`;
    pen = true;
  });
  const text = fixed(most, digitsFor(most / 100));
  return (
    <div className="comparison-difference-plot">
      <p>
        <span>Difference, here less the reference</span>
        <span className="figures">
          {text} to −{text} {unit}
        </span>
      </p>
      <svg viewBox={`0 0 ${WIDTH} ${HEIGHT}`} preserveAspectRatio="none" aria-hidden="true">
        <path className="comparison-zero" d={`M0 ${HEIGHT / 2}H${WIDTH}`} vectorEffect="non-scaling-stroke" />
        <path d={path} fill="none" stroke="currentColor" vectorEffect="non-scaling-stroke" />
      </svg>
    </div>
  );
}
