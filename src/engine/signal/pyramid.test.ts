import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildPyramid, summarize } from './pyramid.ts';

const samplesOf = (numbers: readonly number[]) => Float32Array.from(numbers);

describe('summarize()', () => {
  it('gives first, lowest and highest in time order, and last', () => {
    expect(summarize(samplesOf([1, -3, 7, 2]), 0, 4)).toEqual([1, -3, 7, 2]);
    expect(summarize(samplesOf([1, 7, -3, 2]), 0, 4)).toEqual([1, 7, -3, 2]);
  });
  it('skips holes and gives four NaN where there is nothing else', () => {
    expect(summarize(samplesOf([Number.NaN, 4, Number.NaN, 2, Number.NaN]), 0, 5)).toEqual([4, 4, 2, 2]);
    expect(summarize(samplesOf([Number.NaN, Number.NaN]), 0, 2).every(Number.isNaN)).toBe(true);
    expect(summarize(samplesOf([1, 2]), 2, 2).every(Number.isNaN)).toBe(true);
  });
  it('repeats a single sample and a constant', () => {
    expect(summarize(samplesOf([5]), 0, 1)).toEqual([5, 5, 5, 5]);
    expect(summarize(samplesOf([2, 2, 2]), 0, 3)).toEqual([2, 2, 2, 2]);
  });
  it('keeps infinities as extremes', () => {
    expect(summarize(samplesOf([0, Number.POSITIVE_INFINITY, 1]), 0, 3)).toEqual([
      0,
      0,
      Number.POSITIVE_INFINITY,
      1,
    ]);
    expect(summarize(samplesOf([Number.NEGATIVE_INFINITY]), 0, 1)[2]).toBe(Number.NEGATIVE_INFINITY);
  });
  it('cuts a range that leaves the samples', () => {
    expect(summarize(samplesOf([1, 2, 3]), -5, 50)).toEqual([1, 1, 3, 3]);
  });
});

describe('buildPyramid()', () => {
  it('gives no level without samples and one block for a few', () => {
    expect(buildPyramid(new Float32Array())).toEqual([]);
    const levels = buildPyramid(samplesOf([3]));
    expect(levels.map(({ blockSize, blocks }) => [blockSize, blocks])).toEqual([[64, 1]]);
    expect([...levels[0]!.values]).toEqual([3, 3, 3, 3]);
  });
  it('ends at the first level with at most 64 blocks, the last partial block included', () => {
    const levels = buildPyramid(new Float32Array(64 * 64 * 4 + 1));
    expect(levels.map(({ blockSize, blocks }) => [blockSize, blocks])).toEqual([
      [64, 257],
      [256, 65],
      [1024, 17],
    ]);
  });
  it('keeps the order of the extremes that both fall in one finer block', () => {
    const samples = new Float32Array(64 * 65).fill(1);
    samples[70] = 9;
    samples[90] = -9;
    expect([...buildPyramid(samples)[1]!.values.slice(0, 4)]).toEqual([1, 9, -9, 1]);
  });
  it('agrees with summarize() of the raw samples at every level and block', () => {
    const value = fc.oneof(
      { weight: 8, arbitrary: fc.float({ noNaN: true }) },
      { weight: 1, arbitrary: fc.constant(Number.NaN) },
    );
    fc.assert(
      fc.property(
        fc.array(value, { minLength: 1, maxLength: 200 }),
        fc.integer({ min: 1, max: 9000 }),
        (few, count) => {
          const samples = Float32Array.from(
            { length: count },
            (_, i) => few[(i * 7 + (i >> 6)) % few.length]!,
          );
          for (const { blockSize, blocks, values } of buildPyramid(samples)) {
            expect(blocks).toBe(Math.ceil(count / blockSize));
            for (let k = 0; k < blocks; k += 1) {
              const whole = summarize(samples, k * blockSize, (k + 1) * blockSize);
              expect([...values.subarray(4 * k, 4 * k + 4)]).toEqual([...whole]);
            }
          }
        },
      ),
      { numRuns: 60 },
    );
  });
});
