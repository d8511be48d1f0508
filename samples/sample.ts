import type { Dialect } from './csv.ts';
import { seededNormal } from './physics/random.ts';

export interface Sample {
  readonly file: string;
  readonly title: string;
  /** What it holds and what to look at; every sample is simulated and says so. */
  readonly text: string;
  readonly cylinders: number;
  readonly csv: () => string;
}

export const comma: Dialect = { delimiter: ',', decimal: '.', timeUnit: 's' };
export const continental: Dialect = { delimiter: ';', decimal: ',', timeUnit: 'ms' };
export const tabbed: Dialect = { delimiter: '\t', decimal: '.', timeUnit: 'us' };

/** White noise added, normal and seeded. */
export function noisy(values: Float64Array, rms: number, seed: number): Float64Array {
  const normal = seededNormal(seed);
  return values.map((value) => value + rms * normal());
}

/** Samples a function of time at equal steps. */
export function sampled(
  startS: number,
  stepS: number,
  count: number,
  at: (timeS: number) => number,
): Float64Array {
  return Float64Array.from({ length: count }, (_, i) => at(startS + i * stepS));
}
