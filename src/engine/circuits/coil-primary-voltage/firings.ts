import { sortedRange } from '../../signal/range.ts';
import { robustDeviation } from '../../signal/statistics.ts';
import { indexAtOrAfter, timeAt } from '../../signal/time.ts';
import type { OnPeriod } from '../switched-load/on-periods.ts';
import { findBurn } from './burn.ts';
import type { CoilTrace, Firing } from './firing.ts';
import { findKick } from './kick.ts';
import { countRing } from './ring.ts';

/** Everything that each switch-off in the capture shows, in order. Periods whose release is not in the capture are left out. */
export function findFirings(
  trace: CoilTrace,
  periods: readonly OnPeriod[],
  railHigh: number | null,
): Firing[] {
  const noise = restNoise(trace, periods);
  return periods.flatMap((on, k): Firing[] => {
    if (on.end === null) return [];
    const off = on.end;
    const until = Math.floor(periods[k + 1]?.start ?? trace.values.length);
    const kick = findKick(trace, off, until, railHigh);
    if (!kick)
      return [{ on: { ...on, end: off }, until, kick, burn: null, rings: null, over: Math.ceil(off) }];
    const burn = findBurn(trace, kick, until);
    if (burn && burn.end === null)
      return [{ on: { ...on, end: off }, until, kick, burn, rings: null, over: until }];
    const ring = countRing(trace, burn?.end ?? kick.to, until, noise);
    return [{ on: { ...on, end: off }, until, kick, burn, rings: ring.count, over: ring.over }];
  });
}

/** Noise about the rest level just before the driver comes on, where nothing rings: median over the firings. */
function restNoise(trace: CoilTrace, periods: readonly OnPeriod[]): number {
  const { values, axis, states } = trace;
  const found: number[] = [];
  for (const { start } of periods) {
    if (start === null) continue;
    const from = indexAtOrAfter(axis, timeAt(axis, start) - 1e-3);
    const quiet = sortedRange(values, from, start - 2);
    if (quiet.length < 20) continue;
    found.push(robustDeviation(quiet) ?? 0);
  }
  found.sort((a, b) => a - b);
  return Math.max(states.noise, found[found.length >> 1] ?? 0);
}
