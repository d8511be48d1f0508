import { describe, expect, it } from 'vitest';
import { random } from '../testing/random.ts';
import { spectralLines } from './spectral-lines.ts';
import { spectrum } from './spectrum.ts';
import { leakage, lobeBins, WINDOW_FUNCTIONS, type WindowFunction, weightOf } from './window-function.ts';

const RATE = 1000;
const sum = (n: number, tones: readonly (readonly [hz: number, volts: number])[], base = 0) =>
  Float64Array.from({ length: n }, (_, i) =>
    tones.reduce((all, [hz, volts]) => all + volts * Math.sin((2 * Math.PI * hz * i) / RATE + 0.3), base),
  );
const windows = Object.keys(WINDOW_FUNCTIONS) as WindowFunction[];

describe('spectrum() with spectralLines()', () => {
  it.each(windows)('reads a sine of 1 V as 1 V with %s, also between two steps', (window) => {
    for (const hz of [50, 50.37, 121.9]) {
      const values = sum(2000, [[hz, 1]], 12);
      const found = spectrum(values, { sampleRateHz: RATE, window, padding: 4 })!;
      const { lines } = spectralLines(found, { window, lengthS: 2 });
      expect(Math.abs(lines[0]!.amplitude - 1)).toBeLessThan(window === 'none' ? 0.02 : 0.005);
      expect(Math.abs(lines[0]!.frequencyHz - hz)).toBeLessThan(0.03);
    }
  });

  it('lists a weak line beside a strong one, and no leakage of the strong one', () => {
    const values = sum(4000, [
      [40.13, 20],
      [80.26, 0.5],
      [311.7, 0.02],
    ]);
    const found = spectrum(values, { sampleRateHz: RATE, window: 'hann', padding: 4 })!;
    const { lines } = spectralLines(found, { window: 'hann', lengthS: 4 });
    expect(lines.map(({ frequencyHz }) => Number(frequencyHz.toFixed(1)))).toEqual([40.1, 80.3, 311.7]);
    expect(lines[1]!.amplitude).toBeCloseTo(0.5, 2);
    expect(lines[2]!.amplitude).toBeCloseTo(0.02, 3);
  });

  it('finds nothing in noise but a rare speck, and nothing in what is flat', () => {
    const seeded = random(7);
    const noise = Float64Array.from({ length: 4096 }, () => seeded.between(-0.5, 0.5));
    const found = spectrum(noise, { sampleRateHz: RATE, window: 'hann', padding: 2 })!;
    expect(spectralLines(found, { window: 'hann', lengthS: 4.096, timesNoise: 5 }).lines).toHaveLength(0);
    const flat = spectrum(new Float64Array(100).fill(3), { sampleRateHz: RATE })!;
    expect(spectralLines(flat, { window: 'hann', lengthS: 0.1 }).lines).toHaveLength(0);
  });
});

describe('weightOf() and leakage()', () => {
  it.each(windows)('%s: the envelope holds every side lobe of the window’s own transform', (window) => {
    const n = 256;
    const weights = Array.from({ length: n }, (_, i) => weightOf(window, i, n));
    const gain = weights.reduce((all, weight) => all + weight, 0);
    for (let d = lobeBins(window) + 0.5; d < 40; d += 0.25) {
      let re = 0;
      let im = 0;
      weights.forEach((weight, i) => {
        re += weight * Math.cos((2 * Math.PI * d * i) / n);
        im += weight * Math.sin((2 * Math.PI * d * i) / n);
      });
      // The formula is that of a continuous window; 256 samples differ from it by the order of 1/n.
      expect(Math.hypot(re, im) / gain).toBeLessThan(leakage(window, d) * 1.15 + 2e-5);
    }
  });
});
