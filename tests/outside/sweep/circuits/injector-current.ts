import { measureInjectorCurrent } from '../../../../src/engine/circuits/injector-current.ts';
import { uniform } from '../../fixtures/random.ts';
import { type Condition, eventTimes, recorded } from '../conditions.ts';
import type { Trial } from '../trial.ts';

/** Saturated (with or without the needle's dent) or peak and hold; falls at the driver's clamp within some 0.2 ms. */
export function injectorCurrentTrial(condition: Condition, seed: number): Trial {
  const next = uniform(seed);
  const between = (low: number, high: number) => low + (high - low) * next();
  const kind = seed % 3;
  const widthS = between(3, 12) * 1e-3;
  const tauS = between(0.8, 2.2) * 1e-3;
  const finalA = between(0.8, 1.2);
  const dent = kind === 1 ? between(0.04, 0.08) * finalA : 0;
  const dentS = tauS * between(0.7, 1.2);
  const peakA = between(3, 4.5);
  const holdA = between(0.8, 1.2);
  const riseS = between(0.8, 1.5) * 1e-3;
  const offs = eventTimes(condition, between(0.06, 0.15), next);
  const rateHz = condition === 'undersampled' ? 4_000 : next() < 0.5 ? 50_000 : 100_000;
  const pulse = (since: number) =>
    kind === 2
      ? since < riseS
        ? (peakA * since) / riseS
        : Math.max(holdA, peakA - ((peakA - holdA) * (since - riseS)) / 0.3e-3)
      : finalA * -Math.expm1(-since / tauS) - dent * Math.exp(-(((since - dentS) / 0.15e-3) ** 2));
  const top = kind === 2 ? peakA : finalA * -Math.expm1(-widthS / tauS);
  const at = (t: number) => {
    for (const off of offs) {
      const since = t - off + widthS;
      if (since >= 0 && t < off) return pulse(since);
      if (t >= off && t < off + 0.15e-3) return pulse(widthS) * (1 - (t - off) / 0.15e-3);
    }
    return 0;
  };
  const cut = condition === 'cut ends';
  const last = offs[offs.length - 1]!;
  const fromS = cut ? offs[0]! - 0.5 * widthS : Math.max(0, offs[0]! - widthS - 0.008);
  const toS = cut ? last - 0.4 * widthS : last + 0.02;
  const noise = (condition === 'noise' ? 0.02 : 0.003) * top;
  const base = { circuit: 'injector-current', unit: 'A', rateHz, fromS, toS, seed, noise } as const;
  if (condition === 'dead' || condition === 'floating') {
    const signal = recorded(
      { ...base, noise: 0.02, fromS: 0, toS: 0.3, hum: condition === 'floating' ? 0.05 : 0 },
      () => 0.01,
    );
    return {
      signal,
      findings: measureInjectorCurrent(signal),
      truths: [
        { key: 'pulse_count', value: 0 },
        ...['pulse_width', 'peak_current', 'hold_current', 'hump_time'].map((key) => ({ key, value: null })),
      ],
      notices: [condition === 'floating' ? 'mains-hum' : 'flat-line'],
    };
  }
  const signal = recorded(
    {
      ...base,
      hum: condition === 'hum' ? 0.02 * top : 0,
      offset: condition === 'offset' ? 0.1 * top : 0,
      sign: condition === 'inverted' ? -1 : 1,
      eightBit: condition === '8-bit' ? [-2 * top, 2 * top] : undefined,
      clipAt: condition === 'clipped' ? 0.8 * top : undefined,
      railNamed: true,
    },
    at,
  );
  const seen = cut ? Math.max(0, offs.length - 2) : offs.length;
  const rough =
    condition === 'noise' || condition === 'hum' || condition === '8-bit' || condition === 'undersampled';
  const clip = condition === 'clipped' ? 0.8 * top : Number.POSITIVE_INFINITY;
  const ms = 1000 * widthS;
  return {
    signal,
    findings: measureInjectorCurrent(signal),
    truths: [
      { key: 'pulse_count', value: seen },
      {
        key: 'pulse_width',
        value: seen ? ms : null,
        within: (1000 / rateHz) * (rough ? 2 : 1) + (rough ? 0.02 : 0.01) * ms,
      },
      { key: 'peak_current', value: seen ? Math.min(top, clip) : null, within: (rough ? 0.04 : 0.02) * top },
      { key: 'hold_current', value: seen && kind === 2 ? holdA : null, within: (rough ? 0.04 : 0.02) * top },
      { key: 'hump_time', value: seen && kind === 1 ? 1000 * dentS : null, within: 0.2 },
    ],
    ...(condition === 'inverted' && { notices: ['clamp-reversed'] }),
    ...(condition === 'clipped' && { notices: ['clipped'] }),
    ...(condition === 'clean' && { noNotices: ['clamp-reversed'] }),
  };
}
