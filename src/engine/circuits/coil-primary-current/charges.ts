import { crossings } from '../../signal/crossings.ts';
import { sortedRange } from '../../signal/range.ts';
import { quantileSorted } from '../../signal/statistics.ts';
import { timeAt } from '../../signal/time.ts';
import type { CurrentTrace } from './trace.ts';

/** One charge of the coil: samples from the first that is above zero for sure to the last before the fall. */
export interface Charge {
  /** First sample with current; null when the capture begins inside the charge. */
  readonly first: number | null;
  /** Last sample before the current falls. */
  readonly last: number;
}

const SHORTEST_S = 0.1e-3;

/**
 * Charges whose switch-off is in the capture. Spikes (a fifth of the longest charge, or under 0.1 ms) are not charges.
 *
 * @param share of the top at which a charge is told from nothing; low for a current that is brought down to a hold.
 */
export function findCharges(trace: CurrentTrace, share = 0.35): Charge[] {
  const { amperes, axis, top, noise } = trace;
  const found = crossings(amperes, { level: share * top, hysteresis: 0.8 * share * top });
  const charges: Charge[] = [];
  let rise: number | null = null;
  for (let k = 0; k < found.count; k += 1) {
    const at = found.at[k]!;
    if (found.rising[k] === 1) rise = at;
    else if (rise !== null || k === 0) {
      charges.push({
        first: rise === null ? null : riseStart(amperes, rise, top, noise),
        last: lastBeforeFall(amperes, rise ?? 0, at, noise),
      });
      rise = null;
    }
  }
  const lengthS = (charge: Charge) => timeAt(axis, charge.last) - timeAt(axis, charge.first ?? 0);
  const longestS = Math.max(0, ...charges.map(lengthS));
  return charges.filter((charge) => lengthS(charge) >= Math.max(SHORTEST_S, 0.2 * longestS));
}

/** Walks down the rise to the first sample above 4 % of the top and 4 × the noise; null when it meets the capture's start. */
function riseStart(amperes: Float32Array, rise: number, top: number, noise: number): number | null {
  const level = Math.max(0.04 * top, 4 * noise);
  let i = Math.ceil(rise);
  while (i > 0 && !(amperes[i - 1]! < level)) i -= 1;
  return i > 0 ? i : null;
}

/** Walks up the fall to the last sample within 4 % or 4 × the noise of the height it falls from. */
function lastBeforeFall(amperes: Float32Array, rise: number, fall: number, noise: number): number {
  const end = Math.floor(fall);
  const part = sortedRange(amperes, Math.max(rise, end - 0.15 * (end - rise) - 4), end + 1);
  const height = part.length > 0 ? quantileSorted(part, 0.75) : 0;
  const level = height - Math.max(0.04 * height, 4 * noise);
  let i = end;
  while (i > rise && !(amperes[i]! >= level)) i -= 1;
  return i;
}
