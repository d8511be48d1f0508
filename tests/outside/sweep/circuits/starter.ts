import { measureStarterCurrent } from '../../../../src/engine/circuits/starter-current.ts';
import { uniform } from '../../fixtures/random.ts';
import { type Condition, recorded } from '../conditions.ts';
import type { Trial, Truth } from '../trial.ts';

/** Inrush that dies away while the engine is brought to speed, one hump a compression, some lower than others, commutator ripple. */
export function starterTrial(condition: Condition, seed: number): Trial {
  const next = uniform(seed);
  const between = (low: number, high: number) => low + (high - low) * next();
  const cylinders = [3, 4, 5, 6, 8][seed % 5]!;
  const rpm = between(110, 280);
  const rateHz = (rpm * cylinders) / 120;
  const onS = between(0.05, 0.25);
  const level = between(100, 220);
  const humpA = level * between(0.2, 0.45);
  const inrush = level * between(2.5, 4);
  const weak = seed % 3 === 0 ? Math.floor(next() * cylinders) : -1;
  const shares = Array.from({ length: cylinders }, (_, k) => (k === weak ? between(0.4, 0.7) : 1));
  const runUpS = condition === 'running up' ? 0.5 : 0.1;
  // Angle in compressions: speed rises as 1 − e^(−t/T) to the rate.
  const phaseAt = (since: number) => rateHz * (since - runUpS * -Math.expm1(-since / runUpS));
  const seconds = condition === 'one event' ? onS + 1.2 / rateHz + runUpS : between(2.2, 3.5);
  const at = (t: number) => {
    const since = t - onS;
    if (since < 0) return 0;
    const phase = phaseAt(since);
    const k = Math.floor(phase);
    const hump = humpA * shares[k % cylinders]! * (0.5 - 0.5 * Math.cos(2 * Math.PI * (phase - k)));
    return (
      level -
      humpA / 2 +
      hump +
      (inrush - level) * Math.exp(-since / 0.05) * -Math.expm1(-since / 0.003) +
      0.03 * level * Math.sin(2 * Math.PI * 40 * phase)
    );
  };
  const sampleRateHz = condition === 'undersampled' ? 500 : next() < 0.5 ? 5_000 : 20_000;
  const cut = condition === 'cut ends';
  const base = {
    circuit: 'starter-current',
    unit: 'A',
    rateHz: sampleRateHz,
    fromS: cut ? onS + 0.6 : 0,
    toS: seconds,
    seed,
    noise: (condition === 'noise' ? 0.06 : 0.01) * level,
  } as const;
  if (condition === 'dead' || condition === 'floating') {
    const signal = recorded({ ...base, noise: 1, hum: condition === 'floating' ? 3 : 0 }, () => 0.5);
    return {
      signal,
      findings: measureStarterCurrent(signal, cylinders),
      truths: ['inrush_peak', 'cranking_mean', 'compression_rate', 'compression_balance', 'rpm_mean'].map(
        (key) => ({ key, value: null }),
      ),
      notices: ['flat-line'],
    };
  }
  const clipAt = condition === 'clipped' ? 1.6 * level : undefined;
  const signal = recorded(
    {
      ...base,
      hum: condition === 'hum' ? 0.05 * level : 0,
      offset: condition === 'offset' ? 6 : 0,
      sign: condition === 'inverted' ? -1 : 1,
      eightBit: condition === '8-bit' ? [-1000, 1000] : undefined,
      clipAt,
      railNamed: true,
    },
    at,
  );
  const findings = measureStarterCurrent(signal, cylinders);
  const inrushFrom = Math.max(0, Math.round((onS - base.fromS) * sampleRateHz));
  const inrushPart = signal.values.subarray(inrushFrom, inrushFrom + Math.round(0.5 * sampleRateHz));
  const highest = inrushPart.reduce((most, one) => Math.max(most, condition === 'inverted' ? -one : one), 0);
  const meanShare = shares.reduce((sum, one) => sum + one, 0) / cylinders;
  const rough = condition !== 'clean';
  const shift = condition === 'offset' ? 6 : 0;
  const truths: Truth[] = [{ key: 'inrush_peak', value: cut ? null : highest, within: 0.005 * highest }];
  if (condition === 'one event') {
    truths.push(
      ...['cranking_mean', 'compression_rate', 'compression_balance'].map((key) => ({ key, value: null })),
    );
  } else {
    // From the top of the third hump to the top of the last whole one, on the way to full speed.
    const timeOf = (phase: number) => {
      let since = phase / rateHz;
      for (let round = 0; round < 60; round += 1) since += (phase - phaseAt(since)) / rateHz;
      return since;
    };
    const lastWhole = Math.floor(phaseAt(seconds - onS));
    const rateFrom = (hump: number) => (lastWhole - 0.5 - hump) / (timeOf(lastWhole - 0.5) - timeOf(hump));
    // Whether the inrush hides the first hump, or counts as one, moves the third by one.
    const [slowest, fastest] = cut ? [rateHz, rateHz] : [rateFrom(1.5), rateFrom(3.5)];
    const meanHz = (slowest + fastest) / 2;
    const settled = 0.01 + (fastest - slowest) / 2 / meanHz;
    truths.push(
      {
        key: 'cranking_mean',
        value: level - humpA / 2 + (humpA * meanShare) / 2 + shift,
        within: 0.03 * level,
      },
      { key: 'compression_rate', value: meanHz, within: settled * rateHz },
      { key: 'rpm_mean', value: (meanHz * 120) / cylinders, within: settled * rpm },
      balanceTruth(shares, rough),
    );
  }
  return {
    signal,
    findings,
    truths,
    ...(condition === 'clipped' && { notices: ['inrush-lower-bound'] }),
    ...(condition === 'inverted' && { notices: ['clamp-reversed'] }),
    ...(condition === 'clean' &&
      weak < 0 && { noNotices: ['uneven-compression', 'rates-disagree', 'no-humps', 'clamp-reversed'] }),
  };
}

/** In order from the first complete one; which that is follows from the start, so any turn of the order counts. */
function balanceTruth(shares: readonly number[], rough: boolean): Truth {
  const mean = shares.reduce((sum, one) => sum + one, 0) / shares.length;
  return {
    key: 'compression_balance',
    value: shares.map((one) => 100 * (one / mean - 1)),
    within: rough ? 12 : 8,
    anyTurn: true,
  };
}
