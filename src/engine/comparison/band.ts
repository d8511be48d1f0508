/**
 * Two-sided 97.5 % points of Student's t by degrees of freedom.
 * Source: NIST/SEMATECH e-Handbook of Statistical Methods, section 1.3.6.7.2; checked against SciPy.
 */
const T_975: readonly number[] = [
  12.706, 4.303, 3.182, 2.776, 2.571, 2.447, 2.365, 2.306, 2.262, 2.228, 2.201, 2.179, 2.16, 2.145, 2.131,
  2.12, 2.11, 2.101, 2.093, 2.086, 2.08, 2.074, 2.069, 2.064, 2.06, 2.056, 2.052, 2.048, 2.045, 2.042,
];

/**
 * 97.5 % point of Student's t. Beyond 30 degrees of freedom the normal's with two terms of its expansion in 1/df
 * (Abramowitz and Stegun 26.7.5), within 0.0002 of the true one.
 */
export function studentT975(degreesOfFreedom: number): number {
  const z = 1.959964;
  return (
    T_975[degreesOfFreedom - 1] ??
    z +
      (z ** 3 + z) / (4 * degreesOfFreedom) +
      (5 * z ** 5 + 16 * z ** 3 + 3 * z) / (96 * degreesOfFreedom ** 2)
  );
}

export interface Band {
  readonly low: number;
  readonly middle: number;
  readonly high: number;
  readonly n: number;
}

/** The least number of references that make a band. */
export const BAND_MINIMUM = 3;

/**
 * Where 95 % of further good ones are expected, for values that spread normally: the prediction interval
 * mean ± t · s · √(1 + 1/n) (Hahn and Meeker, Statistical Intervals, 1991, section 4.7; formula from memory).
 * `leastHalfWidth` keeps equal members from making a band of no width. Null for fewer than three finite values.
 */
export function bandOf(values: readonly number[], leastHalfWidth = 0): Band | null {
  const finite = values.filter(Number.isFinite);
  const n = finite.length;
  if (n < BAND_MINIMUM) return null;
  const middle = finite.reduce((sum, value) => sum + value, 0) / n;
  const variance = finite.reduce((sum, value) => sum + (value - middle) ** 2, 0) / (n - 1);
  const half = Math.max(studentT975(n - 1) * Math.sqrt(variance * (1 + 1 / n)), leastHalfWidth);
  return { low: middle - half, middle, high: middle + half, n };
}
