import { mean, standardDeviation } from '../../signal/statistics.ts';
import type { Cranking } from './cranking.ts';
import { findHumps, type Hump, spectralRate } from './humps.ts';

/** Compressions from the third on, where the inrush has died away, and the two rates. */
export interface Compressions {
  readonly humps: readonly Hump[];
  readonly rateByHumpsHz: number;
  readonly rateBySpectrumHz: number | null;
}

/** The inrush takes this long to die away; only for the first look. Common practice, no source. */
const INRUSH_S = 0.25;
/** The end of cranking is found on a trace smoothed over 30 ms; the hump that it cuts is no compression. */
const RELEASE_S = 0.02;

/** null: no compression stands out from the noise (an engine without compression, or one that does not turn). */
export function findCompressions(cranking: Cranking): Compressions | null {
  const { means, startSeen } = cranking;
  const released = cranking.to < means.values.length;
  const to = cranking.to - (released ? Math.round(RELEASE_S / means.stepS) : 0);
  const skip = startSeen
    ? Math.min(Math.round(INRUSH_S / means.stepS), Math.floor(0.35 * (to - cranking.from)))
    : 0;
  const from = cranking.from + skip;
  const firstLook = spectralRate(means, from, to);
  if (firstLook === null) return null;
  const first = cranking.from + (startSeen ? Math.round(0.02 / means.stepS) : 0);
  const period = 1 / (firstLook * means.stepS);
  const all = findHumps(means, first, to, firstLook).filter(({ at }) => !released || at < to - 0.4 * period);
  const humps = startSeen ? all.slice(2) : all;
  if (humps.length < 3) return null;
  const start = humps[0]!;
  const last = humps[humps.length - 1]!;
  const noise = noiseOfMeans(cranking);
  const height = mean(humps.map((hump) => hump.height)) ?? 0;
  if (height < 4 * noise || height < 0.015 * cranking.level) return null;
  return {
    humps,
    rateByHumpsHz: (humps.length - 1) / ((last.at - start.at) * means.stepS),
    rateBySpectrumHz: spectralRate(means, Math.floor(start.at), Math.ceil(last.at)) ?? firstLook,
  };
}

/** What remains of the noise once the humps are smoothed: from second differences of the means. */
function noiseOfMeans({ means, from, to }: Cranking): number {
  const differences: number[] = [];
  for (let i = from + 1; i + 1 < to; i += 1) {
    differences.push(means.values[i - 1]! - 2 * means.values[i]! + means.values[i + 1]!);
  }
  return (standardDeviation(differences) ?? 0) / Math.sqrt(6) / 2;
}
