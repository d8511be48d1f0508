import { measureOther } from '../../../../src/engine/circuits/other.ts';
import { uniform } from '../../fixtures/random.ts';
import { type Condition, recorded } from '../conditions.ts';
import type { Trial, Truth } from '../trial.ts';

/** A sine, a rectangle or a trapezoid of any duty about any level. */
export function otherTrial(condition: Condition, seed: number): Trial {
  const next = uniform(seed);
  const between = (low: number, high: number) => low + (high - low) * next();
  const kind = seed % 3;
  const periodS = between(5, 40) * 1e-3;
  const duty = between(0.15, 0.85);
  const low = between(-5, 5);
  const height = between(1, 20);
  const flankS = kind === 2 ? periodS * 0.05 : 2e-6;
  const count = condition === 'one event' ? 1.4 : between(8, 20);
  const startS = between(0, 1) * periodS;
  const wide = duty * periodS;
  const at = (t: number) => {
    const inside = (((t - startS) % periodS) + periodS) % periodS;
    if (kind === 0) return low + (height / 2) * (1 + Math.sin((2 * Math.PI * inside) / periodS));
    const rise = inside / flankS + 0.5;
    const fall = (wide - inside) / flankS + 0.5;
    const again = (inside - periodS) / flankS + 0.5;
    return low + height * Math.min(1, Math.max(0, Math.min(rise, fall), again));
  };
  const base = {
    circuit: 'other',
    unit: 'V',
    rateHz: condition === 'undersampled' ? 8 / periodS : next() < 0.5 ? 20_000 : 100_000,
    fromS: 0,
    toS: count * periodS,
    seed,
    noise: (condition === 'noise' ? 0.03 : 0.001) * height,
  } as const;
  if (condition === 'dead' || condition === 'floating') {
    const signal = recorded({ ...base, toS: 0.3, noise: 0.02 }, () => low);
    return {
      signal,
      findings: measureOther(signal),
      truths: [
        ...['period', 'frequency', 'duty', 'pulse_width'].map((key) => ({ key, value: null })),
        { key: 'mean', value: low, within: 0.01 },
      ],
    };
  }
  const signal = recorded(
    {
      ...base,
      hum: condition === 'hum' ? 0.05 * height : 0,
      offset: condition === 'offset' ? 3 : 0,
      sign: condition === 'inverted' ? -1 : 1,
      eightBit: condition === '8-bit' ? [-50, 50] : undefined,
      clipAt: condition === 'clipped' ? low + 0.75 * height : undefined,
      railNamed: true,
    },
    at,
  );
  const list = Array.from(signal.values);
  const sum = list.reduce((all, one) => all + one, 0) / list.length;
  const squares = list.reduce((all, one) => all + one * one, 0) / list.length;
  const rough =
    condition === 'noise' || condition === 'hum' || condition === '8-bit' || condition === 'undersampled';
  const stepMs = 1000 / base.rateHz;
  const ms = 1000 * periodS;
  const inMs = stepMs * (rough ? 2 : 1) + (rough ? 0.02 : 0.002) * ms;
  const share = condition === 'inverted' ? 1 - duty : duty;
  // Clipping lowers the upper state and the mesial with it; flanks of a twentieth of the period shift the width with it.
  const clipShift = condition === 'clipped' && kind === 2 ? 1000 * flankS : 0;
  const truths: Truth[] = [
    { key: 'lowest', value: Math.min(...list), within: 1e-5 },
    { key: 'highest', value: Math.max(...list), within: 1e-5 },
    { key: 'mean', value: sum, within: 1e-4 * height },
    { key: 'rms', value: Math.sqrt(squares), within: 1e-4 * height + 1e-4 * Math.sqrt(squares) },
  ];
  if (condition === 'one event')
    truths.push(
      { key: 'period', value: null },
      { key: 'frequency', value: null },
      { key: 'duty', value: null },
    );
  else
    truths.push(
      { key: 'period', value: ms, within: inMs },
      { key: 'frequency', value: 1000 / ms, within: (rough ? 0.01 : 0.002) * (1000 / ms) },
    );
  if (kind !== 0 && condition !== 'one event')
    truths.push(
      { key: 'duty', value: 100 * share, within: (100 * (inMs + clipShift)) / ms },
      { key: 'pulse_width', value: share * ms, within: inMs + clipShift },
    );
  if (kind === 0) truths.push({ key: 'duty', value: null }, { key: 'pulse_width', value: null });
  return {
    signal,
    findings: measureOther(signal),
    truths,
    ...(condition === 'clipped' && { notices: ['clipped'] }),
  };
}
