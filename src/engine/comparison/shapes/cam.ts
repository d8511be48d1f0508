import { stateLevels } from '../../signal/levels.ts';
import { cycleOriginDeg } from '../cycle-origin.ts';
import { overDegrees } from '../over-degrees.ts';
import type { Side } from '../types.ts';
import { binMeans, extremes, finished } from './resample.ts';

/** A cam over 720 crank degrees from the reference mark, 5.625 degrees a number: 0 low, 1 high; a two-wire one in its largest swing. */
export function camShape(side: Side): Float32Array | null {
  if (!side.wheel) return null;
  const origin = cycleOriginDeg(side, side.wheel) ?? (side.circuit === 'cam-vr' ? 0 : null);
  if (origin === null) return null;
  const cycle = overDegrees(side, side.wheel, origin, 720, 720 / 1024);
  if (side.circuit === 'cam-vr') {
    const found = extremes(cycle);
    const scale = found ? Math.max(-found[0], found[1]) : 0;
    return scale > 0 ? finished([binMeans(cycle, 128).map((value) => value / scale)]) : null;
  }
  const levels = stateLevels(side.values);
  if (!levels || !(levels.high > levels.low)) return null;
  const { low, high } = levels;
  return finished([binMeans(cycle, 128).map((value) => (value - low) / (high - low))]);
}
