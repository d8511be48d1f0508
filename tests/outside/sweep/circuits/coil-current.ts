import { measureCoilPrimaryCurrent } from '../../../../src/engine/circuits/coil-primary-current.ts';
import { uniform } from '../../fixtures/random.ts';
import { type Condition, eventTimes, recorded } from '../conditions.ts';
import type { Trial, Truth } from '../trial.ts';

/** i = I∞ (1 − e^(−t/τ)), free, held by a limiter, or run up to its own end. */
export function coilCurrentTrial(condition: Condition, seed: number): Trial {
  const next = uniform(seed);
  const between = (low: number, high: number) => low + (high - low) * next();
  const kind = seed % 3;
  const dwellS = between(2, 6) * 1e-3;
  const tauS = kind === 2 ? dwellS / between(7, 12) : dwellS * between(0.5, 3);
  const finalA = between(4, 12) / (kind === 2 ? 1 : -Math.expm1(-dwellS / tauS));
  const free = finalA * -Math.expm1(-dwellS / tauS);
  const limitA = kind === 1 ? free * between(0.5, 0.85) : Number.POSITIVE_INFINITY;
  const peak = Math.min(free, limitA);
  const offs = eventTimes(condition, between(0.02, 0.08), next);
  const rateHz = condition === 'undersampled' ? 10_000 : next() < 0.5 ? 100_000 : 250_000;
  const cut = condition === 'cut ends';
  const fromS = cut ? offs[0]! - 0.5 * dwellS : Math.max(0, offs[0]! - dwellS - 0.006);
  const last = offs[offs.length - 1]!;
  const toS = cut ? last - 0.3 * dwellS : last + 0.008;
  const at = (t: number) => {
    for (const off of offs) {
      const since = t - off + dwellS;
      if (since >= 0 && t < off) return Math.min(limitA, finalA * -Math.expm1(-since / tauS));
      if (t >= off && t < off + 5e-6) return peak * (1 - (t - off) / 5e-6);
    }
    return 0;
  };
  const noise = (condition === 'noise' ? between(0.01, 0.03) : 0.002) * peak;
  const base = { circuit: 'coil-primary-current', unit: 'A', rateHz, fromS, toS, seed, noise } as const;
  if (condition === 'dead' || condition === 'floating') {
    const signal = recorded(
      { ...base, noise: 0.03, fromS: 0, toS: 0.3, hum: condition === 'floating' ? 0.1 : 0 },
      () => 0.02,
    );
    return {
      signal,
      findings: measureCoilPrimaryCurrent(signal),
      truths: [
        { key: 'firing_count', value: 0 },
        ...['dwell', 'peak_current', 'current_limited', 'time_constant'].map((key) => ({ key, value: null })),
      ],
      notices: [condition === 'floating' ? 'mains-hum' : 'flat-line'],
    };
  }
  const clipAt = condition === 'clipped' ? 0.8 * peak : undefined;
  const signal = recorded(
    {
      ...base,
      hum: condition === 'hum' ? 0.02 * peak : 0,
      offset: condition === 'offset' ? 0.15 * peak : 0,
      sign: condition === 'inverted' ? -1 : 1,
      eightBit: condition === '8-bit' ? [-20, 20] : undefined,
      clipAt,
      railNamed: true,
    },
    at,
  );
  const findings = measureCoilPrimaryCurrent(signal);
  const seen = cut ? offs.slice(0, -1) : offs;
  const rough =
    condition === 'noise' || condition === 'hum' || condition === '8-bit' || condition === 'undersampled';
  const ms = 1000 * dwellS;
  const lastTenth = (peak - Math.min(limitA, finalA * -Math.expm1((-0.9 * dwellS) / tauS))) / peak;
  const truths: Truth[] = [
    { key: 'firing_count', value: seen.length },
    {
      key: 'dwell',
      value: cut && seen.length < 2 ? null : ms,
      within: (1000 / rateHz) * (rough ? 2 : 1) + (rough ? 0.02 : 0.002) * ms,
    },
    {
      key: 'peak_current',
      value: Math.min(peak, clipAt ?? peak),
      within: (rough ? 0.03 : 0.01) * peak + (condition === '8-bit' ? 20 / 255 : 0),
    },
  ];
  if (condition !== 'clipped') {
    truths.push({ key: 'current_limited', value: lastTenth <= 0.01 });
    truths.push({ key: 'time_constant', value: 1000 * tauS, within: (rough ? 0.3 : 0.1) * 1000 * tauS });
  }
  return {
    signal,
    findings,
    truths,
    ...(condition === 'clipped' && { notices: ['clipped'] }),
    ...(condition === 'inverted' && { notices: ['clamp-reversed'] }),
    ...(condition === 'offset' && { notices: ['clamp-zero'] }),
    ...(condition === 'clean' && {
      noNotices: ['clipped', 'current-step', 'probe-factor', 'clamp-reversed', 'clamp-zero'],
    }),
  };
}
