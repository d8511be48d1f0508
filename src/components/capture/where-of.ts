import { degreesAt, turnAt } from '../plot/degrees.ts';
import { fixed } from '../plot/format.ts';
import type { PlotMark, PlotWheel } from '../plot/types.ts';

/** Where a mark stands, in the way a technician says it: "turn 2 at 132°", else seconds. */
export function whereOf(mark: Pick<PlotMark, 'kind' | 'from' | 'to'>, wheel: PlotWheel | null): string {
  const turn = wheel === null ? null : turnAt(wheel, mark.from);
  const degrees = wheel === null ? null : degreesAt(wheel, mark.from);
  const start =
    turn !== null && degrees !== null
      ? `turn ${turn + 1} at ${fixed(degrees % 360, 0)}°`
      : `${fixed(mark.from, 4)} s`;
  if (mark.kind === 'level') return 'level';
  return mark.to === null ? start : `${start}, ${fixed((mark.to - mark.from) * 1e3, 1)} ms long`;
}
