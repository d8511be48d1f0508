import { measureFuelPumpCurrent } from '../../../../src/engine/circuits/fuel-pump-current.ts';
import { uniform } from '../../fixtures/random.ts';
import { type Condition, recorded } from '../conditions.ts';
import type { Trial } from '../trial.ts';

/** One ripple a bar, each bar a little different, on a mean of some amperes. */
export function fuelPumpTrial(condition: Condition, seed: number): Trial {
  const next = uniform(seed);
  const between = (low: number, high: number) => low + (high - low) * next();
  const rpm = between(3000, 7500);
  const rateHz = (rpm * 8) / 60;
  const mean = between(3, 9);
  const rippleA = mean * between(0.06, 0.15);
  const bars = Array.from({ length: 8 }, () => between(0.75, 1));
  const barMean = bars.reduce((sum, one) => sum + one, 0) / 8;
  const at = (t: number) => {
    const phase = rateHz * t;
    const k = Math.floor(phase);
    return (
      mean + rippleA * (bars[((k % 8) + 8) % 8]! * Math.sin(Math.PI * (phase - k)) - (barMean * 2) / Math.PI)
    );
  };
  const seconds = condition === 'one event' ? 0.05 : between(0.3, 0.8);
  const base = {
    circuit: 'fuel-pump-current',
    unit: 'A',
    rateHz: condition === 'undersampled' ? 1.7 * rateHz : next() < 0.5 ? 20_000 : 50_000,
    fromS: 0,
    toS: seconds,
    seed,
    noise: (condition === 'noise' ? 0.25 : 0.03) * rippleA,
  } as const;
  if (condition === 'dead' || condition === 'floating') {
    const signal = recorded({ ...base, noise: 0.02, hum: condition === 'floating' ? 0.08 : 0 }, () => 0.02);
    return {
      signal,
      findings: measureFuelPumpCurrent(signal),
      truths: [
        { key: 'ripple_rate', value: null },
        { key: 'pump_speed', value: null },
      ],
      notices: ['flat-line'],
    };
  }
  const inverted = condition === 'inverted';
  const clipAt = condition === 'clipped' ? mean + 0.2 * rippleA : undefined;
  const signal = recorded(
    {
      ...base,
      hum: condition === 'hum' ? 0.5 * rippleA : 0,
      offset: condition === 'offset' ? 0.4 : 0,
      sign: inverted ? -1 : 1,
      eightBit: condition === '8-bit' ? [-10, 10] : undefined,
      clipAt,
      railNamed: true,
    },
    at,
  );
  const sum = signal.values.reduce((all, one) => all + one, 0) / signal.values.length;
  const known = condition !== 'undersampled' && condition !== 'one event';
  return {
    signal,
    findings: measureFuelPumpCurrent(signal),
    truths: [
      { key: 'mean', value: sum, within: 0.002 * Math.abs(sum) },
      { key: 'ripple_rate', value: known ? rateHz : null, within: 0.01 * rateHz },
      { key: 'pump_speed', value: known ? rpm : null, within: 0.01 * rpm },
    ],
    ...(condition === 'clipped' && { notices: ['clipped'] }),
    ...(condition === 'clean' && { noNotices: ['flat-line', 'clipped'] }),
  };
}
