import type { ReadingSpec } from './types.ts';

/** What a value shows by the bands of its reading; null outside them: the person judges. `value` in the reading's own unit. */
export function judgeReading(spec: ReadingSpec, value: number): string | null {
  const band = spec.bands?.find(
    ({ from, to }) =>
      value >= (from ?? Number.NEGATIVE_INFINITY) && value <= (to ?? Number.POSITIVE_INFINITY),
  );
  return band?.finding ?? null;
}
