import type { Findings } from '../capture.ts';
import { absent, type Notice } from '../value.ts';
import { clippedNotices } from './events/clipped.ts';
import { flatLine } from './events/flat-line.ts';
import { inWords } from './events/in-words.ts';
import { whole } from './events/whole.ts';
import { findRipple } from './fuel-pump-current/ripple.ts';
import { momentsOf } from './other/moments.ts';
import type { MeasuredSignal } from './types.ts';

/** Commutator bars of a usual pump. Common practice, no source. */
export const USUAL_BARS = 8;

/**
 * Current of the fuel pump: mean, and the ripple of its commutator. An even count of bars gives one ripple a bar, an odd
 * count two, so speed = 60 · rate / ripples a turn.
 */
export function measureFuelPumpCurrent(signal: MeasuredSignal, bars = USUAL_BARS): Findings {
  const { values, axis, unit } = signal;
  const moments = momentsOf(values, axis);
  if (!moments) {
    const reason = 'no samples to measure';
    return {
      values: [
        absent('mean', unit, reason),
        absent('ripple_rate', 'Hz', reason),
        absent('pump_speed', 'rpm', reason),
      ],
      notices: [],
    };
  }
  const mean = { key: 'mean', value: moments.mean, unit, n: moments.n, evidence: whole(axis) };
  const clipped = clippedNotices(signal, 'mean and ripple are off');
  const highest = Math.max(Math.abs(values[moments.highestAt]!), Math.abs(values[moments.lowestAt]!));
  if (highest < 0.3) {
    const reason = 'the pump takes no current in the capture';
    return {
      values: [mean, absent('ripple_rate', 'Hz', reason), absent('pump_speed', 'rpm', reason)],
      notices: [
        flatLine(
          axis,
          inWords(moments.mean, unit),
          'the pump has no feed or ground (fuse, relay, cut-off, control), an open winding or worn brushes, the clamp is off or on another wire, or its factor was forgotten',
        ),
      ],
    };
  }
  const ripple = findRipple(signal);
  if (ripple.rateHz === null) {
    return {
      values: [mean, absent('ripple_rate', 'Hz', ripple.reason), absent('pump_speed', 'rpm', ripple.reason)],
      notices: clipped,
    };
  }
  const ripplesATurn = bars % 2 === 0 ? bars : 2 * bars;
  const evidence = [{ from: ripple.fromS, to: ripple.toS }];
  return {
    values: [
      mean,
      { key: 'ripple_rate', value: ripple.rateHz, unit: 'Hz', evidence },
      { key: 'pump_speed', value: (60 * ripple.rateHz) / ripplesATurn, unit: 'rpm', evidence },
    ],
    notices: [...clipped, barsNotice(signal, bars)],
  };
}

function barsNotice(signal: MeasuredSignal, bars: number): Notice {
  return {
    code: 'bar-count',
    severity: 'info',
    text: `The speed is for a commutator with ${bars} bars (common practice, no source). The count is not seen in the ripple rate: with another count the speed changes in proportion, and an odd count gives two ripples a bar.`,
    evidence: whole(signal.axis),
  };
}
