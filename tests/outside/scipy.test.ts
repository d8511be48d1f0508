import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { lowPass } from '../../src/engine/derived/low-pass.ts';
import { crossings } from '../../src/engine/signal/crossings.ts';
import { fitExponential } from '../../src/engine/signal/exponential-fit.ts';
import { findPeaks } from '../../src/engine/signal/peaks.ts';
import { spectrum, strongestIn } from '../../src/engine/signal/spectrum.ts';
import { weightOf } from '../../src/engine/signal/window-function.ts';

/** Made by scipy/make-references.py, which says how; kept so that the comparison needs no SciPy. */
interface References {
  readonly peaks: ReadonlyArray<{
    x: number[];
    options: { prominence?: number; distance?: number };
    index: number[];
    prominence: number[];
  }>;
  readonly crossings: { x: number[]; level: number; at: number[]; rising: boolean[] };
  readonly spectra: ReadonlyArray<{ x: number[]; window: 'hann' | 'none'; amplitude: number[] }>;
  readonly charges: ReadonlyArray<{
    t: number[];
    i: number[];
    final: number;
    zeroS: number;
    tau: number;
    tauError: number;
  }>;
  readonly filtered: { readonly x: number[]; readonly y: number[] };
  readonly windows: Readonly<Record<'hann' | 'blackman' | 'flattop', number[]>>;
}
const references = JSON.parse(
  readFileSync(new URL('./fixtures/scipy.json', import.meta.url), 'utf8'),
) as References;

describe('findPeaks() and scipy.signal.find_peaks', () => {
  it.each(references.peaks.map((one, k) => [k, one] as const))(
    'give the same peaks and prominences, case %i',
    (_, { x, options, index, prominence }) => {
      const found = findPeaks(Float64Array.from(x), options);
      expect(found.map((peak) => peak.index)).toEqual(index);
      found.forEach((peak, k) => {
        expect(peak.prominence).toBeCloseTo(prominence[k]!, 9);
      });
    },
  );
});

describe('crossings() and NumPy', () => {
  it('give the same passages on straight lines between samples, within float32', () => {
    const { x, level, at, rising } = references.crossings;
    const found = crossings(Float32Array.from(x), { level, hysteresis: 0 });
    expect([...found.rising].map((one) => one === 1)).toEqual(rising);
    at.forEach((one, k) => {
      expect(Math.abs(found.at[k]! - one)).toBeLessThan(1e-4);
    });
  });
});

describe('spectrum() and scipy.fft.rfft', () => {
  it.each(references.spectra.map((one, k) => [k, one] as const))(
    'give the same amplitudes, case %i',
    (_, { x, window, amplitude }) => {
      const found = spectrum(Float64Array.from(x), { sampleRateHz: 1, window })!;
      expect(found.amplitude).toHaveLength(amplitude.length);
      amplitude.forEach((one, k) => {
        expect(Math.abs(found.amplitude[k]! - one)).toBeLessThan(1e-10);
      });
      expect(strongestIn(found, 0.01, 0.4)!.frequencyHz).toBeCloseTo(0.0371, 3);
    },
  );
});

describe('weightOf() and scipy.signal.get_window', () => {
  it.each(['hann', 'blackman', 'flattop'] as const)('give the same weights, %s', (name) => {
    references.windows[name].forEach((weight, i) => {
      expect(Math.abs(weightOf(name, i, 60) - weight)).toBeLessThan(1e-10);
    });
  });
});

describe('lowPass() and scipy.signal.filtfilt of scipy.signal.butter', () => {
  it('give the same samples, ends included, within float32', () => {
    const { x, y } = references.filtered;
    const made = lowPass(Float32Array.from(x), 1000, 50);
    y.forEach((value, i) => {
      expect(Math.abs(made[i]! - value)).toBeLessThan(2e-6);
    });
  });
});

describe('fitExponential() and scipy.optimize.curve_fit', () => {
  it.each(references.charges.map((one, k) => [k, one] as const))(
    'agree on τ, zero and final value, case %i',
    (_, { t, i, final, zeroS, tau, tauError }) => {
      const found = fitExponential(Float64Array.from(t), Float64Array.from(i))!;
      // Both minimise the same sum of squares: they differ by their stopping rules only, far inside the standard error.
      expect(Math.abs(1 / found.rate - tau)).toBeLessThan(0.02 * tauError);
      expect(Math.abs(found.final! / final - 1)).toBeLessThan(1e-3);
      expect(Math.abs(found.zeroS! - zeroS)).toBeLessThan(1e-7);
      expect(found.rateError / found.rate / (tauError / tau)).toBeGreaterThan(0.8);
      expect(found.rateError / found.rate / (tauError / tau)).toBeLessThan(1.25);
    },
  );
});

describe('the kept references', () => {
  const script = fileURLToPath(new URL('./scipy/make-references.py', import.meta.url));
  const present = spawnSync('/usr/bin/python3', ['-c', 'import scipy']).status === 0;
  it.skipIf(!present)(
    'are what the script still makes (skipped: Python with SciPy not present)',
    { timeout: 60_000 },
    () => {
      const made = spawnSync('/usr/bin/python3', [script, '--print'], {
        encoding: 'utf8',
        maxBuffer: 1 << 26,
      });
      expect(made.status).toBe(0);
      const again = JSON.parse(made.stdout) as References;
      expect(again.peaks.map((one) => one.index)).toEqual(references.peaks.map((one) => one.index));
      again.charges.forEach((one, k) => {
        expect(one.tau).toBeCloseTo(references.charges[k]!.tau, 9);
      });
    },
  );
});
