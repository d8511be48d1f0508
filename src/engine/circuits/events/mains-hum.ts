import type { TimeAxis } from '../../capture.ts';
import { readingNoise } from '../../signal/resolution.ts';
import { timeAt } from '../../signal/time.ts';
import type { Notice } from '../../value.ts';
import { inWords } from './in-words.ts';
import { whole } from './whole.ts';

export interface MainsHum {
  readonly frequencyHz: number;
  /** Half the swing from peak to peak of the hum, in the signal's unit. */
  readonly amplitude: number;
}

/** The nets of the world run at 50 or 60 Hz and stay within one per cent. */
const NETS_HZ = [49.5, 49.75, 50, 50.25, 50.5, 59.4, 59.7, 60, 60.3, 60.6] as const;
/** Share of the movement that one sine must explain; a square wave of the same period leaves it 0.81, pulses less. */
const LEAST_SHARE = 0.86;
const SHORTEST_S = 0.04;
const MOST = 20_000;

/**
 * Mains hum when it is all that moves in a trace: one sine of 50 or 60 Hz, fitted by least squares, explains nearly all of the
 * variance beside the noise. null otherwise, below 40 ms (two periods) or 250 samples a second, and for changes only.
 */
export function mainsHumOnly(values: Float32Array, axis: TimeAxis): MainsHum | null {
  const count = values.length;
  if (count < 20 || (axis.kind === 'uneven' && axis.holds)) return null;
  const lengthS = timeAt(axis, count - 1) - timeAt(axis, 0);
  if (lengthS < SHORTEST_S || count / lengthS < 250) return null;
  // Even choices of at most 20,000 samples; the odd divisor keeps them off multiples of the net's period.
  const step = Math.max(1, Math.min(Math.ceil(count / MOST), Math.floor(count / lengthS / 250)) | 1);
  const noise = readingNoise(values);
  let best: (MainsHum & { readonly share: number }) | null = null;
  for (const frequencyHz of NETS_HZ) {
    const fit = fitSine(values, axis, step, frequencyHz);
    if (!fit) return null;
    const moved = Math.max(fit.variance - noise * noise, 0.5 * fit.amplitude ** 2);
    const share = moved > 0 ? (0.5 * fit.amplitude ** 2) / moved : 0;
    const sure = fit.variance > 0 && 0.5 * fit.amplitude ** 2 > 0.5 * fit.variance;
    if (sure && share > LEAST_SHARE && fit.amplitude > (best?.amplitude ?? 1.5 * noise))
      best = { frequencyHz: frequencyHz < 55 ? 50 : 60, amplitude: fit.amplitude, share };
  }
  return best && { frequencyHz: best.frequencyHz, amplitude: best.amplitude };
}

/** v = c + a cos ωt + b sin ωt by the normal equations of the three; variance about the mean. */
function fitSine(values: Float32Array, axis: TimeAxis, step: number, frequencyHz: number) {
  const omega = 2 * Math.PI * frequencyHz;
  const originS = timeAt(axis, 0);
  let n = 0;
  let [c, s, cc, ss, cs, v, vc, vs, vv] = [0, 0, 0, 0, 0, 0, 0, 0, 0];
  const base = values.find((value) => !Number.isNaN(value)) ?? 0;
  for (let i = 0; i < values.length; i += step) {
    const value = values[i]! - base;
    if (Number.isNaN(value)) continue;
    const angle = omega * (timeAt(axis, i) - originS);
    const cosine = Math.cos(angle);
    const sine = Math.sin(angle);
    n += 1;
    c += cosine;
    s += sine;
    cc += cosine * cosine;
    ss += sine * sine;
    cs += cosine * sine;
    v += value;
    vc += value * cosine;
    vs += value * sine;
    vv += value * value;
  }
  if (n < 20) return null;
  const [CC, SS, CS] = [cc - (c * c) / n, ss - (s * s) / n, cs - (c * s) / n];
  const [VC, VS] = [vc - (v * c) / n, vs - (v * s) / n];
  const determinant = CC * SS - CS * CS;
  if (!(determinant > 0)) return null;
  const a = (VC * SS - VS * CS) / determinant;
  const b = (VS * CC - VC * CS) / determinant;
  return { amplitude: Math.hypot(a, b), variance: Math.max(0, vv / n - (v / n) ** 2) };
}

/** Nothing but hum: usually an input that hangs in the air. */
export function humNotice(axis: TimeAxis, { frequencyHz, amplitude }: MainsHum, unit: string): Notice {
  return {
    code: 'mains-hum',
    severity: 'watch',
    text:
      `Apart from mains hum (${frequencyHz} Hz, ${inWords(2 * amplitude, unit)} from peak to peak) nothing moves. Usually the lead hangs in the air: a probe that does not touch, ` +
      'an open wire, or its ground left off. A circuit that is switched off looks the same. Check the connection first, then record again while cranking.',
    evidence: whole(axis),
  };
}
