import { measureSupplyVoltage } from '../../../../src/engine/circuits/supply-voltage.ts';
import { uniform } from '../../fixtures/random.ts';
import { type Condition, recorded } from '../conditions.ts';
import type { Trial, Truth } from '../trial.ts';

/** Rest, the dip at inrush, a plateau that waves with the compressions, rest again. */
export function supplyTrial(condition: Condition, seed: number): Trial {
  const next = uniform(seed);
  const between = (low: number, high: number) => low + (high - low) * next();
  const rest = between(12, 12.9);
  const plateau = between(9.2, 11);
  const dip = between(0.8, 1.8);
  const onS = between(0.15, 0.5);
  const rateHz = between(4, 12);
  const wave = between(0.15, 0.35);
  const offS = onS + (condition === 'one event' ? 0.6 : between(1.5, 2.5));
  const cut = condition === 'cut ends';
  const runUpS = condition === 'running up' ? 0.3 : 0.05;
  const at = (t: number) => {
    const since = t - onS;
    if (since < 0) return rest;
    if (t > offS) return rest - 0.3 * Math.exp(-(t - offS) / 0.3);
    const settled = -Math.expm1(-since / runUpS);
    return (
      plateau -
      dip * Math.exp(-since / runUpS) * -Math.expm1(-since / 0.002) +
      wave * settled * Math.cos(2 * Math.PI * rateHz * since)
    );
  };
  const sampleRateHz = condition === 'undersampled' ? 200 : next() < 0.5 ? 5_000 : 20_000;
  const base = {
    circuit: 'supply-voltage',
    unit: 'V',
    rateHz: sampleRateHz,
    fromS: cut ? onS + 0.5 : 0,
    toS: cut ? offS - 0.1 : offS + 0.8,
    seed,
    noise: condition === 'noise' ? 0.1 : 0.01,
  } as const;
  if (condition === 'dead' || condition === 'floating') {
    const level = seed % 2 ? 0.03 : 12.5;
    const signal = recorded(
      { ...base, fromS: 0, toS: 2, hum: condition === 'floating' ? 0.2 : 0 },
      () => level,
    );
    return {
      signal,
      findings: measureSupplyVoltage(signal),
      truths: [
        { key: 'rest_level', value: level, within: 0.1 },
        { key: 'cranking_mean', value: null },
      ],
      ...(level < 1 ? { notices: ['near-zero'] } : { noNotices: ['near-zero', 'deep-dip', 'probe-factor'] }),
    };
  }
  const inverted = condition === 'inverted';
  const signal = recorded(
    {
      ...base,
      hum: condition === 'hum' ? 0.15 : 0,
      offset: condition === 'offset' ? 0.3 : 0,
      sign: inverted ? -1 : 1,
      eightBit: condition === '8-bit' ? [-20, 20] : undefined,
      clipAt: condition === 'clipped' ? 0.5 * (rest + plateau) : undefined,
      railNamed: true,
    },
    at,
  );
  const findings = measureSupplyVoltage(signal);
  if (inverted)
    return { signal, findings, truths: [{ key: 'cranking_mean', value: null }], notices: ['upside-down'] };
  const shift = condition === 'offset' ? 0.3 : 0;
  const lowest = signal.values.reduce((least, one) => Math.min(least, one), Number.POSITIVE_INFINITY);
  const truths: Truth[] = [
    {
      key: 'rest_level',
      value: cut ? null : Math.min(rest, condition === 'clipped' ? 0.5 * (rest + plateau) : rest) + shift,
      within: 0.08,
    },
    { key: 'lowest', value: lowest, within: 1e-6 },
    { key: 'cranking_mean', value: plateau + shift, within: condition === 'running up' ? 0.2 : 0.12 },
  ];
  return {
    signal,
    findings,
    truths,
    ...(condition === 'clipped' && { notices: ['clipped'] }),
    ...(condition === 'clean' && {
      noNotices: [...(lowest > 7.05 ? ['deep-dip'] : []), 'near-zero', 'probe-factor', 'clipped'],
    }),
  };
}
