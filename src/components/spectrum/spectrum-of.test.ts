import { describe, expect, it } from 'vitest';
import type { Taken } from './read-samples.ts';
import { openingHz, spectrumOf } from './spectrum-of.ts';

const taken = (values: Float64Array, sampleRateHz: number): Taken => ({
  values,
  sampleRateHz,
  from: 0,
  to: values.length / sampleRateHz,
  shortened: false,
});
const sine = (n: number, rate: number, hz: number, amplitude: number, mean: number) =>
  Float64Array.from({ length: n }, (_, i) => mean + amplitude * Math.sin((2 * Math.PI * hz * i) / rate));

describe('spectrumOf()', () => {
  it.each(['hann', 'blackman', 'flattop'] as const)(
    'reads a 23.4 A ripple on 170 A as 23.4 A at its frequency, with %s',
    (window) => {
      const values = sine(19_000, 10_000, 6.51, 23.4, 170.2);
      const shown = spectrumOf(taken(values, 10_000), window)!;
      expect(shown.lines).toHaveLength(1);
      expect(shown.lines[0]!.amplitude).toBeCloseTo(23.4, 1);
      expect(Math.abs(shown.lines[0]!.frequencyHz - 6.51)).toBeLessThan(0.03);
      expect(shown.mean).toBeCloseTo(values.reduce((sum, value) => sum + value, 0) / values.length, 9);
      expect(shown.highestHz).toBe(5000);
    },
  );

  it('says what it can tell apart: two steps of one over the length with Hann', () => {
    const shown = spectrumOf(taken(sine(19_000, 10_000, 6.51, 1, 0), 10_000), 'hann')!;
    expect(shown.lobeHz).toBeCloseTo(2 / 1.9, 9);
  });

  it('is null for a handful of samples or holes only, and counts holes', () => {
    expect(spectrumOf(taken(new Float64Array(8), 100), 'hann')).toBeNull();
    expect(spectrumOf(taken(new Float64Array(100).fill(Number.NaN), 100), 'hann')).toBeNull();
    const values = sine(200, 100, 5, 1, 0);
    values[7] = Number.NaN;
    expect(spectrumOf(taken(values, 100), 'hann')?.holes).toBe(1);
  });
});

describe('openingHz()', () => {
  it('shows the strong lines with room, or everything where none stands out', () => {
    const shown = spectrumOf(taken(sine(10_000, 1000, 40, 1, 0), 1000), 'hann')!;
    expect(openingHz(shown)).toBeGreaterThan(60);
    expect(openingHz(shown)).toBeLessThan(120);
    const flat = spectrumOf(taken(new Float64Array(1000).fill(2), 1000), 'hann')!;
    expect(openingHz(flat)).toBe(500);
  });
});
