import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { bandOf, studentT975 } from '../../src/engine/comparison/band.ts';
import { correlate } from '../../src/engine/comparison/correlate.ts';
import { shapeDistance } from '../../src/engine/comparison/shapes/distance.ts';
import type { Side } from '../../src/engine/comparison/types.ts';
import { median, quantile, standardDeviation } from '../../src/engine/signal/statistics.ts';

/** Made by scipy/make-comparison-references.py, which says how; kept so that the comparison needs no SciPy. */
interface References {
  readonly studentT975: readonly (readonly [number, number])[];
  readonly bands: readonly {
    readonly values: number[];
    readonly low: number;
    readonly high: number;
    readonly median: number;
    readonly sd: number;
    readonly quarter: number;
  }[];
  readonly lag: { readonly a: number[]; readonly b: number[]; readonly lag: number };
  readonly distances: readonly { readonly a: number[]; readonly b: number[]; readonly distance: number }[];
}
const references: References = JSON.parse(
  readFileSync(new URL('./fixtures/comparison-scipy.json', import.meta.url), 'utf8'),
);

describe('studentT975() and scipy.stats.t.ppf', () => {
  it.each(references.studentT975)('agree at %i degrees of freedom within 0.001', (degrees, value) => {
    expect(Math.abs(studentT975(degrees) - value)).toBeLessThan(0.001);
  });
});

describe('bandOf(), median(), quantile(), standardDeviation() and NumPy with scipy.stats', () => {
  it.each(references.bands.map((one) => [one.values.length, one] as const))(
    'agree for %i members: ends within the table’s three decimals of t, the rest to nine digits',
    (_, { values, low, high, median: middle, sd, quarter }) => {
      const band = bandOf(values)!;
      expect(Math.abs(band.low - low)).toBeLessThan(0.002);
      expect(Math.abs(band.high - high)).toBeLessThan(0.002);
      expect(median(values)).toBeCloseTo(middle, 9);
      expect(standardDeviation(values)).toBeCloseTo(sd, 9);
      expect(quantile(values, 0.25)).toBeCloseTo(quarter, 9);
    },
  );
});

const side = (values: readonly number[]): Side => ({
  name: 'a',
  circuit: 'other',
  unit: 'V',
  axis: { kind: 'even', startS: 0, stepS: 0.001, count: values.length },
  values: Float32Array.from(values),
  wheel: null,
  measured: [],
});

describe('correlate() and scipy.signal.correlate', () => {
  it('find the same lag within one of their steps', () => {
    const { a, b, lag } = references.lag;
    const found = correlate(side(a), side(b));
    expect(found.by).toBe('correlation');
    expect(Math.abs(found.shiftS! - lag * 0.001)).toBeLessThan(0.001);
  });
});

describe('shapeDistance() and scipy.spatial.distance.euclidean', () => {
  it.each(references.distances.map((one, k) => [k, one] as const))(
    'agree, pair %i',
    (_, { a, b, distance }) => {
      expect(shapeDistance(a, b)).toBeCloseTo(distance, 9);
    },
  );
});
