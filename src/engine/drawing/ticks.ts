/** Ticks in steps of 1, 2 or 5 times a power of ten. */

/** The smallest such step at or above `least`; 1 for what is not a positive number. */
export function niceStep(least: number): number {
  if (!(least > 0) || !Number.isFinite(least)) return 1;
  const power = 10 ** Math.floor(Math.log10(least) + 1e-12);
  for (const factor of [1, 2, 5]) if (factor * power >= least * (1 - 1e-9)) return factor * power;
  return 10 * power;
}

/** Multiples of `step` from `from` to `to`, ends included. Computed as integer * step, so errors do not add up. */
export function multiples(from: number, to: number, step: number): number[] {
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.floor(to / step + 1e-9);
  const ticks: number[] = [];
  for (let i = first; i <= last && ticks.length < 1000; i += 1) ticks.push(i === 0 ? 0 : i * step);
  return ticks;
}

/** At most about `wanted` round values between lowest and highest, zero among them when it lies inside. */
export function valueTicks(lowest: number, highest: number, wanted = 3): { ticks: number[]; step: number } {
  const step = niceStep((highest - lowest) / (wanted + 1));
  let ticks = multiples(lowest, highest, step);
  let wide = step;
  while (ticks.length > wanted + 1) {
    wide = niceStep(wide * 1.5);
    ticks = multiples(lowest, highest, wide);
  }
  return { ticks, step: wide };
}

/** Value range of a lane: what occurs, zero when it is near, and a twelfth free above and below. */
export function laneRange(lowest: number, highest: number): { low: number; high: number } {
  if (!Number.isFinite(lowest) || !Number.isFinite(highest)) return { low: -1, high: 1 };
  const span = highest - lowest;
  if (span === 0) {
    const half = Math.abs(highest) > 0 ? Math.abs(highest) * 0.5 : 1;
    return { low: Math.min(0, lowest) - half * 0.5, high: Math.max(0, highest) + half * 0.5 };
  }
  const low = lowest > 0 && lowest < span * 0.5 ? 0 : lowest;
  const high = highest < 0 && -highest < span * 0.5 ? 0 : highest;
  const free = (high - low) / 12;
  return { low: low - free, high: high + free };
}
