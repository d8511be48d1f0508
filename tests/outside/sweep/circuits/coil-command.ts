import { measureCoilCommand } from '../../../../src/engine/circuits/coil-command.ts';
import { uniform } from '../../fixtures/random.ts';
import { type Condition, eventTimes, recorded } from '../conditions.ts';
import type { Trial } from '../trial.ts';

/** Logic pulses with flanks of some microseconds; active low where the condition inverts. */
export function coilCommandTrial(condition: Condition, seed: number): Trial {
  const next = uniform(seed);
  const between = (low: number, high: number) => low + (high - low) * next();
  const dwellS = between(1.5, 6) * 1e-3;
  const low = between(0, 0.4);
  const high = seed % 2 ? between(4.6, 5) : between(11, 14);
  const offs = eventTimes(condition, between(0.02, 0.08), next);
  const rateHz = condition === 'undersampled' ? 5_000 : next() < 0.5 ? 50_000 : 200_000;
  const cut = condition === 'cut ends';
  const last = offs[offs.length - 1]!;
  const fromS = cut ? offs[0]! - 0.5 * dwellS : Math.max(0, offs[0]! - dwellS - 0.006);
  const toS = cut ? last - 0.5 * dwellS : last + 0.008;
  const flankS = between(1, 20) * 1e-6;
  const at = (t: number) => {
    for (const off of offs) {
      const rise = (t - off + dwellS) / flankS;
      const fall = (off - t) / flankS + 1;
      if (rise > 0 && fall > 0) return low + (high - low) * Math.min(1, rise, fall);
    }
    return low;
  };
  const span = high - low;
  const base = {
    circuit: 'coil-command',
    unit: 'V',
    rateHz,
    fromS,
    toS,
    seed,
    noise: (condition === 'noise' ? 0.05 : 0.004) * span,
  } as const;
  if (condition === 'dead' || condition === 'floating') {
    const signal = recorded(
      { ...base, noise: 0.02, fromS: 0, toS: 0.3, hum: condition === 'floating' ? 0.3 : 0 },
      () => (seed % 2 ? 0.03 : 4.9),
    );
    return {
      signal,
      findings: measureCoilCommand(signal),
      truths: [
        { key: 'pulse_count', value: 0 },
        { key: 'dwell', value: null },
        { key: 'active_state', value: null },
      ],
      notices: [condition === 'floating' ? 'mains-hum' : 'flat-line'],
    };
  }
  const inverted = condition === 'inverted';
  const signal = recorded(
    {
      ...base,
      hum: condition === 'hum' ? 0.1 * span : 0,
      offset: (condition === 'offset' ? 1.5 : 0) + (inverted ? low + high : 0),
      sign: inverted ? -1 : 1,
      eightBit: condition === '8-bit' ? [-20, 20] : undefined,
      clipAt: condition === 'clipped' ? low + 0.8 * span : undefined,
      railNamed: false,
    },
    at,
  );
  const seen = cut ? offs.slice(1, -1).length : offs.length;
  const rough =
    condition === 'noise' || condition === 'hum' || condition === '8-bit' || condition === 'undersampled';
  const ms = 1000 * dwellS;
  const shift = condition === 'offset' ? 1.5 : 0;
  const inLevel =
    (rough ? 0.03 : 0.01) * span +
    (condition === '8-bit' ? 20 / 255 : 0) +
    (condition === 'hum' ? 0.1 * span : 0);
  return {
    signal,
    findings: measureCoilCommand(signal),
    truths: [
      { key: 'pulse_count', value: seen },
      {
        key: 'dwell',
        value: seen ? ms : null,
        within: (1000 / rateHz) * (rough ? 2 : 1) + (rough ? 0.01 : 0.002) * ms,
      },
      { key: 'level_low', value: low + shift, within: inLevel },
      {
        key: 'level_high',
        value: condition === 'clipped' ? low + 0.8 * span : high + shift,
        within: inLevel,
      },
      { key: 'active_state', value: inverted ? 'low' : 'high' },
    ],
    ...(inverted && { notices: ['active-low'] }),
    ...(condition === 'clean' && { noNotices: ['active-low', 'short-spikes', 'low-swing'] }),
  };
}
