import { spectralLines } from '../../engine/signal/spectral-lines.ts';
import { type Spectrum, spectrum } from '../../engine/signal/spectrum.ts';
import { lobeBins, type WindowFunction } from '../../engine/signal/window-function.ts';
import type { Taken } from './read-samples.ts';

/** Zeros added so that a line between two steps keeps its height; never more steps than this. */
const MOST_STEPS = 1 << 19;

export interface ShownSpectrum {
  readonly found: Spectrum;
  readonly lines: readonly { readonly frequencyHz: number; readonly amplitude: number }[];
  readonly noise: number;
  readonly mean: number;
  readonly holes: number;
  readonly samples: number;
  readonly lengthS: number;
  /** Half the main lobe: lines closer than this are one. */
  readonly lobeHz: number;
  readonly highestHz: number;
}

/** The amplitude spectrum of what was taken; null for fewer than 16 samples or nothing but holes. */
export function spectrumOf({ values, sampleRateHz }: Taken, window: WindowFunction): ShownSpectrum | null {
  const samples = values.length;
  if (samples < 16) return null;
  let sum = 0;
  let there = 0;
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    sum += value;
    there += 1;
  }
  if (there === 0) return null;
  const padding = [8, 4, 2, 1].find((times) => samples * times <= MOST_STEPS) ?? 1;
  const found = spectrum(values, { sampleRateHz, window, padding });
  if (found === null) return null;
  const lengthS = samples / sampleRateHz;
  return {
    found,
    ...spectralLines(found, { window, lengthS }),
    mean: sum / there,
    holes: samples - there,
    samples,
    lengthS,
    lobeHz: lobeBins(window) / lengthS,
    highestHz: sampleRateHz / 2,
  };
}

/** Frequencies that are worth a first look: up to a little over the highest line that is not far weaker than the strongest. */
export function openingHz({ lines, lobeHz, highestHz }: ShownSpectrum): number {
  const [strongest] = lines;
  if (strongest === undefined) return highestHz;
  const telling = lines.filter(({ amplitude }) => amplitude > strongest.amplitude / 40);
  const top = Math.max(...telling.map(({ frequencyHz }) => frequencyHz));
  return Math.min(Math.max(top * 1.3, strongest.frequencyHz * 2, lobeHz * 12), highestHz);
}
