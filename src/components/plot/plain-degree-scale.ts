import { multiples } from './ticks.ts';
import type { TimeScale } from './time-scale.ts';
import type { View } from './types.ts';

const STEPS = [0.5, 1, 2, 5, 10, 30, 60, 90, 180, 360];
const APART = 44;

/** The scale of an axis that is crank degrees already: alternate fields of 30, labels that thin out, ticks of 10. */
export function plainDegreeScale(view: View, widthPx: number): TimeScale {
  const pixels = widthPx / (view.to - view.from);
  const px = (degrees: number) => (degrees - view.from) * pixels;
  const step = STEPS.find((each) => each * pixels >= APART) ?? 360;
  const field = Math.min(Math.max(step, 1), 30 * pixels >= 6 ? 30 : 360);
  const fields = multiples(Math.floor(view.from / field) * field, view.to, field)
    .map((at) => ({
      from: Math.max(px(at), 0),
      to: Math.min(px(at + field), widthPx),
      dark: Math.abs(Math.round(at / field)) % 2 === 0,
    }))
    .filter(({ from, to }) => to > from);
  const tick = 10 * pixels >= 5 ? Math.min(10, step / 2) : 30;
  return {
    fields,
    labels: multiples(view.from, view.to, step).map((at) => ({
      at: px(at),
      text: `${Number(at.toFixed(1))}°`,
    })),
    ticks: tick * pixels >= 4 ? multiples(view.from, view.to, tick).map(px) : [],
  };
}
