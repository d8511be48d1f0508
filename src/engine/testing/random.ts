/** Seeded numbers for tests: the same on every machine (mulberry32; normal deviates by Box and Muller). */
export interface Random {
  /** Even from 0 to 1. */
  next(): number;
  /** Even from `low` to `high`. */
  between(low: number, high: number): number;
  /** Mean 0, deviation 1. */
  normal(): number;
}

export function random(seed: number): Random {
  let state = seed >>> 0;
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  return {
    next,
    between: (low, high) => low + (high - low) * next(),
    normal: () => Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next()),
  };
}
