import type { MeasurementsJson } from '../../contract/areas/captures.ts';
import { degreesAt } from '../plot/degrees.ts';
import type { PlotWheel, View } from '../plot/types.ts';

export interface CrankSpeed {
  /** Frequency of order 1: turns a second. */
  readonly hz: number;
  readonly from: 'teeth' | 'numbers';
}

/** Mean crank speed of a stretch from the teeth in it, else the capture's measured mean; null when neither is known. */
export function crankSpeed(
  wheel: PlotWheel | null,
  measurements: MeasurementsJson | undefined,
  view: View,
): CrankSpeed | null {
  if (wheel !== null && wheel.teethS.length > 1) {
    const from = Math.max(view.from, wheel.teethS[0]!);
    const to = Math.min(view.to, wheel.teethS.at(-1)!);
    const turned = to > from ? (degreesAt(wheel, to) ?? 0) - (degreesAt(wheel, from) ?? 0) : 0;
    // From less than half a turn the speed of one compression would be taken for the mean.
    if (turned >= 180) return { hz: turned / 360 / (to - from), from: 'teeth' };
  }
  for (const { values } of measurements?.signals ?? []) {
    const rpm = values.find(({ key }) => key === 'rpm_mean')?.value;
    if (typeof rpm === 'number' && rpm > 0) return { hz: rpm / 60, from: 'numbers' };
  }
  return null;
}
