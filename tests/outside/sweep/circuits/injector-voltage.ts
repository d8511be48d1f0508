import { measureInjectorVoltage } from '../../../../src/engine/circuits/injector-voltage.ts';
import { uniform } from '../../fixtures/random.ts';
import { type Condition, eventTimes, recorded } from '../conditions.ts';
import type { Trial, Truth } from '../trial.ts';

/** Feed, pulled low for the pulse, held at the driver's clamp, exponential decay with or without the needle's hump. */
export function injectorVoltageTrial(condition: Condition, seed: number): Trial {
  const next = uniform(seed);
  const between = (low: number, high: number) => low + (high - low) * next();
  const supply = between(9.5, 14);
  const on = between(0.1, 1);
  const widthS = between(1.5, 14) * 1e-3;
  const clamp = between(35, 90);
  const clampS = between(0.08, 0.3) * 1e-3;
  const tauS = between(0.2, 0.6) * 1e-3;
  const humpV = seed % 2 ? between(1.5, 3) : 0;
  const humpS = clampS + tauS * between(2, 3.5);
  const offs = eventTimes(condition, between(0.06, 0.15), next);
  const rateHz = condition === 'undersampled' ? 10_000 : next() < 0.5 ? 100_000 : 250_000;
  const cut = condition === 'cut ends';
  const last = offs[offs.length - 1]!;
  const fromS = cut ? offs[0]! - 0.5 * widthS : Math.max(0, offs[0]! - widthS - 0.008);
  const toS = cut ? last - 0.4 * widthS : last + 0.02;
  const at = (t: number) => {
    for (let k = offs.length - 1; k >= 0; k -= 1) {
      const since = t - offs[k]!;
      if (since >= 0) {
        if (since < clampS) return clamp;
        return (
          supply +
          (clamp - supply) * Math.exp(-(since - clampS) / tauS) +
          humpV * Math.exp(-(((since - humpS) / 0.13e-3) ** 2))
        );
      }
      if (since >= -widthS) return on;
    }
    return supply;
  };
  const span = clamp - on;
  const noise = condition === 'noise' ? 0.01 * span : 0.04;
  const base = { circuit: 'injector-voltage', unit: 'V', rateHz, fromS, toS, seed, noise } as const;
  if (condition === 'dead' || condition === 'floating') {
    const signal = recorded({ ...base, fromS: 0, toS: 0.3, hum: condition === 'floating' ? 0.3 : 0 }, () =>
      seed % 2 ? 0.05 : supply,
    );
    return {
      signal,
      findings: measureInjectorVoltage(signal),
      truths: [
        { key: 'pulse_count', value: 0 },
        ...['pulse_width', 'clamp_peak', 'hump_time'].map((key) => ({ key, value: null })),
      ],
      notices: [condition === 'floating' && seed % 2 ? 'mains-hum' : 'flat-line'],
    };
  }
  const clipAt = condition === 'clipped' ? 0.6 * clamp : undefined;
  const signal = recorded(
    {
      ...base,
      hum: condition === 'hum' ? 0.4 : 0,
      offset: condition === 'offset' ? 0.5 : 0,
      sign: condition === 'inverted' ? -1 : 1,
      eightBit: condition === '8-bit' ? [-20, 100] : undefined,
      clipAt,
      railNamed: true,
    },
    at,
  );
  const findings = measureInjectorVoltage(signal);
  if (condition === 'inverted') {
    return {
      signal,
      findings,
      truths: ['pulse_count', 'pulse_width', 'clamp_peak'].map((key) => ({ key, value: null })),
      notices: ['upside-down'],
    };
  }
  const seen = cut ? Math.max(0, offs.length - 2) : offs.length;
  const rough =
    condition === 'noise' || condition === 'hum' || condition === '8-bit' || condition === 'undersampled';
  const ms = 1000 * widthS;
  const shift = condition === 'offset' ? 0.5 : 0;
  const released = cut ? offs.slice(0, -1) : offs;
  const highest = released.map((off) => {
    const from = Math.ceil((off - fromS) * rateHz - 1e-6);
    return Math.max(...signal.values.subarray(from, from + Math.ceil((clampS + tauS) * rateHz) + 1));
  });
  const truths: Truth[] = [
    { key: 'pulse_count', value: seen },
    {
      key: 'pulse_width',
      value: seen ? ms : null,
      within: (1000 / rateHz) * (rough ? 2 : 1) + (rough ? 0.01 : 0.002) * ms,
    },
    {
      key: 'clamp_peak',
      value: highest.length ? highest.reduce((sum, one) => sum + one, 0) / highest.length : null,
      within: 1e-3 * span,
    },
    { key: 'supply_level', value: supply + shift, within: 0.01 * span },
    { key: 'on_level', value: seen ? on + shift : null, within: 0.01 * span },
    humpV > 0 && condition !== 'clipped'
      ? { key: 'hump_time', value: 1000 * humpS, within: 0.15 }
      : { key: 'hump_time', value: humpV > 0 ? 1000 * humpS : null, within: 0.15 },
  ];
  return {
    signal,
    findings,
    truths,
    ...(condition === 'clipped' && { notices: ['kick-lower-bound'] }),
    ...(condition === 'clean' && {
      noNotices: ['kick-lower-bound', 'no-kick', 'chopped', 'probe-factor', 'ac-coupled', 'high-on-level'],
    }),
  };
}
