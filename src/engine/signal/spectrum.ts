import FFT from 'fft.js';
import { type WindowFunction, weightOf } from './window-function.ts';

/** Single-sided amplitude spectrum: `amplitude[k]` is that of a sine at `k * stepHz`, in the signal's unit. */
export interface Spectrum {
  readonly stepHz: number;
  readonly amplitude: Float64Array;
}

export interface SpectrumOptions {
  readonly sampleRateHz: number;
  /** Default: Hann, scaled so that a sine on a bin keeps its amplitude. `none`: the samples as they are. */
  readonly window?: WindowFunction;
  /** Zeros are added up to the next power of two at or above this many times the length. Default 1. */
  readonly padding?: number;
  /** Subtract the mean first. Default true. */
  readonly removeMean?: boolean;
}

/**
 * Discrete Fourier transform of real samples. The length need not be a power of two: the window spans the samples, zeros
 * follow. Holes (NaN) count as the mean. Fewer than four samples: null.
 */
export function spectrum(values: Float32Array | Float64Array, options: SpectrumOptions): Spectrum | null {
  const n = values.length;
  if (n < 4) return null;
  const { sampleRateHz, window = 'hann', padding = 1, removeMean = true } = options;
  let size = 4;
  while (size < n * padding) size *= 2;
  let sum = 0;
  let count = 0;
  for (let i = 0; i < n; i += 1) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    sum += value;
    count += 1;
  }
  if (count === 0) return null;
  const mean = sum / count;
  const base = removeMean ? mean : 0;
  const data = new Float64Array(size);
  let gain = 0;
  for (let i = 0; i < n; i += 1) {
    const weight = weightOf(window, i, n);
    const value = values[i]!;
    data[i] = weight * ((Number.isNaN(value) ? mean : value) - base);
    gain += weight;
  }
  const out = new Float64Array(2 * size);
  new FFT(size).realTransform(out, data);
  const amplitude = new Float64Array(size / 2 + 1);
  for (let k = 0; k <= size / 2; k += 1) {
    const whole = k === 0 || k === size / 2 ? 1 : 2;
    amplitude[k] = (whole * Math.hypot(out[2 * k]!, out[2 * k + 1]!)) / gain;
  }
  return { stepHz: sampleRateHz / size, amplitude };
}

export interface SpectralPeak {
  readonly frequencyHz: number;
  readonly amplitude: number;
  /** Amplitude over the median of the band: how far it stands out. */
  readonly prominence: number;
}

/**
 * The highest point of the spectrum between two frequencies that is a local maximum, refined by a parabola through the
 * logarithms of three bins. No local maximum in the band: null.
 */
export function strongestIn(found: Spectrum, lowHz: number, highHz: number): SpectralPeak | null {
  const { stepHz, amplitude } = found;
  const from = Math.max(1, Math.ceil(lowHz / stepHz));
  const to = Math.min(amplitude.length - 2, Math.floor(highHz / stepHz));
  let best = -1;
  for (let k = from; k <= to; k += 1) {
    const here = amplitude[k]!;
    if (here > amplitude[k - 1]! && here >= amplitude[k + 1]! && (best < 0 || here > amplitude[best]!))
      best = k;
  }
  if (best < 0) return null;
  const [a, b, c] = [-1, 0, 1].map((k) => Math.log(Math.max(amplitude[best + k]!, 1e-300))) as [
    number,
    number,
    number,
  ];
  const bend = a - 2 * b + c;
  const shift = bend < 0 ? (0.5 * (a - c)) / bend : 0;
  const band = amplitude.slice(from, to + 1).sort();
  const middle = band[band.length >> 1]!;
  return {
    frequencyHz: (best + shift) * stepHz,
    amplitude: amplitude[best]!,
    prominence: middle > 0 ? amplitude[best]! / middle : Number.POSITIVE_INFINITY,
  };
}
