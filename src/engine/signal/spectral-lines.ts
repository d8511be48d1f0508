import type { Spectrum } from './spectrum.ts';
import { leakage, lobeBins, type WindowFunction } from './window-function.ts';

/** A line of the spectrum that stands out of the noise. */
export interface SpectralLine {
  readonly frequencyHz: number;
  /** That of a sine, in the signal's unit. */
  readonly amplitude: number;
}

export interface SpectralLines {
  /** Strongest first. */
  readonly lines: readonly SpectralLine[];
  /** Median amplitude outside of the mean's own lobe: half of all steps lie above it. */
  readonly noise: number;
}

export interface SpectralLinesOptions {
  readonly window: WindowFunction;
  /** Length of what was transformed, in seconds, without the zeros that were added. */
  readonly lengthS: number;
  /** A line is this many times the noise. Default 4. */
  readonly timesNoise?: number;
  readonly most?: number;
}

/** What leaks is reckoned this much higher: lines add up, and samples at the ends do not fit a period. */
const LEAKAGE_MARGIN = 2;

/**
 * Local maxima over `timesNoise` times the noise that are no leakage of a stronger line, their place and height refined by a
 * parabola through the logarithms of three steps. Lines nearer than the main lobe are one. What is flat has none.
 */
export function spectralLines(found: Spectrum, options: SpectralLinesOptions): SpectralLines {
  const { stepHz, amplitude } = found;
  const { window, lengthS, timesNoise = 4, most = 12 } = options;
  const lobeHz = lobeBins(window) / lengthS;
  const first = Math.max(1, Math.ceil(lobeHz / stepHz));
  const sorted = amplitude.slice(first).sort();
  const noise = sorted.length === 0 ? 0 : sorted[sorted.length >> 1]!;
  const highest = sorted[sorted.length - 1] ?? 0;
  const floor = Math.max(timesNoise * noise, highest * 1e-6);
  const maxima: SpectralLine[] = [];
  for (let k = Math.max(first, 1); k < amplitude.length - 1; k += 1) {
    const here = amplitude[k]!;
    if (here > floor && here > amplitude[k - 1]! && here >= amplitude[k + 1]!)
      maxima.push(refined(found, k, window === 'flattop' ? Math.round(lobeHz / stepHz) : 0));
  }
  maxima.sort((a, b) => b.amplitude - a.amplitude);
  const lines: SpectralLine[] = [];
  // What is left of the mean leaks like a line at 0 Hz, and every line has an image at its negative frequency.
  const base: SpectralLine = { frequencyHz: 0, amplitude: amplitude[0]! };
  const leakedAt = (hz: number, line: SpectralLine) =>
    line.amplitude *
    (leakage(window, (hz - line.frequencyHz) * lengthS) + leakage(window, (hz + line.frequencyHz) * lengthS));
  for (const one of maxima) {
    if (lines.length >= most) break;
    const hz = one.frequencyHz;
    const within = lines.some((line) => Math.abs(hz - line.frequencyHz) < lobeHz);
    const leaked = [base, ...lines].reduce((all, line) => all + leakedAt(hz, line), 0);
    if (!within && one.amplitude > LEAKAGE_MARGIN * leaked) lines.push(one);
  }
  return { lines, noise };
}

/** With `reach` the place is the middle of the power that many steps to both sides: a flat top has no bend to go by. */
function refined({ stepHz, amplitude }: Spectrum, k: number, reach: number): SpectralLine {
  const [a, b, c] = [k - 1, k, k + 1].map((at) => Math.log(Math.max(amplitude[at]!, 1e-300))) as [
    number,
    number,
    number,
  ];
  const bend = a - 2 * b + c;
  const shift = bend < 0 ? (0.5 * (a - c)) / bend : 0;
  let place = k + shift;
  if (reach > 0) {
    let power = 0;
    let moment = 0;
    for (let i = Math.max(k - reach, 0); i <= Math.min(k + reach, amplitude.length - 1); i += 1) {
      power += amplitude[i]! ** 2;
      moment += i * amplitude[i]! ** 2;
    }
    place = moment / power;
  }
  return { frequencyHz: place * stepHz, amplitude: Math.exp(b - 0.25 * (a - c) * shift) };
}
