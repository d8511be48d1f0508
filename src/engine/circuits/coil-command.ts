import type { Findings } from '../capture.ts';
import { stateLevels } from '../signal/levels.ts';
import { rangeMedian } from '../signal/range.ts';
import { readingNoise } from '../signal/resolution.ts';
import { absent, type Notice, type Value } from '../value.ts';
import { findPulses, type Pulses } from './coil-command/pulses.ts';
import { bounded } from './events/bounded.ts';
import { clippedNotices } from './events/clipped.ts';
import { flatLine } from './events/flat-line.ts';
import { counted, inWords } from './events/in-words.ts';
import { humNotice, mainsHumOnly } from './events/mains-hum.ts';
import { oncePerEvent } from './events/once-per-event.ts';
import { whole } from './events/whole.ts';
import type { MeasuredSignal } from './types.ts';

/** Shares of the two states closer to a half than this do not tell which one is active. */
const UNCLEAR_SHARE = 0.4;
/** Hum of less than this from peak to peak lies on a flat line, and is no reason to doubt the connection. */
const LEAST_HUM = 0.25;

/**
 * Logic pulses to a coil with its own driver. The width of the active state is the dwell; the active state is the one held
 * for less time.
 */
export function measureCoilCommand(signal: MeasuredSignal): Findings {
  const { values, axis, unit } = signal;
  const holds = axis.kind === 'uneven' && axis.holds;
  const states = stateLevels(values);
  const noise = holds ? 0 : readingNoise(values);
  const level = rangeMedian(values, 0, values.length);
  if (level === null) return steady('no samples to measure', signal, null);
  const hum = holds ? null : mainsHumOnly(values, axis);
  if (hum && 2 * hum.amplitude > LEAST_HUM) {
    return {
      ...steady('nothing but mains hum in the capture', signal, level),
      notices: [humNotice(axis, hum, unit)],
    };
  }
  if (!states || states.bimodality < 0.8 || states.high - states.low < 12 * noise) {
    return steady('no pulse in the capture', signal, level);
  }
  const pulses = findPulses(values, axis, states);
  if (!pulses) return steady('no edge in the capture', signal, level);
  const none = 'no pulse with both edges in the capture';
  const all = whole(axis);
  return {
    values: [
      { key: 'pulse_count', value: pulses.complete.length, unit: '1', evidence: bounded(pulses.complete) },
      oncePerEvent(
        'dwell',
        'ms',
        pulses.complete.map((evidence) => ({ value: (evidence.to - evidence.from) * 1000, evidence })),
        none,
      ),
      { key: 'level_low', value: states.low, unit, evidence: all },
      { key: 'level_high', value: states.high, unit, evidence: all },
      { key: 'active_state', value: pulses.activeHigh ? 'high' : 'low', unit: '1', evidence: all },
    ],
    notices: notices(signal, pulses, holds ? null : states.high - states.low),
  };
}

function notices(signal: MeasuredSignal, pulses: Pulses, swing: number | null): readonly Notice[] {
  const found: Notice[] = [];
  const add = (code: string, severity: Notice['severity'], text: string) =>
    found.push({ code, severity, text, evidence: whole(signal.axis) });
  if (!pulses.activeHigh) {
    add(
      'active-low',
      'info',
      'The low state is held for less time and is taken as the active one, so the dwell is the width of the low pulses. A trace that is turned over looks the same; the wiring diagram decides.',
    );
  }
  if (pulses.activeShare > UNCLEAR_SHARE) {
    add(
      'active-state-unclear',
      'watch',
      `Both states are held for about as long (${Math.round(100 * pulses.activeShare)} % of the time for the shorter one), so which one charges the coil is not sure, and the dwell with it. Compare with the coil's current.`,
    );
  }
  if (pulses.glitches > 0) {
    add(
      'short-spikes',
      'info',
      `${counted(pulses.glitches, 'spike')} or gaps shorter than 20 µs were passed over: usually pick-up from the ignition itself.`,
    );
  }
  if (swing !== null && signal.unit === 'V' && swing < 2) {
    add(
      'low-swing',
      'watch',
      `The command swings by only ${inWords(swing, 'V')}; a logic line usually swings by about 5 V or by battery voltage (common practice, no source). A driver may not take it. Check the factor of the probe, the ground and the load on the line.`,
    );
  }
  found.push(...clippedNotices(signal, 'the level there is a bound, times are good'));
  return found;
}

function steady(reason: string, signal: MeasuredSignal, level: number | null): Findings {
  const count: Value =
    level === null
      ? absent('pulse_count', '1', reason)
      : { key: 'pulse_count', value: 0, unit: '1', evidence: whole(signal.axis) };
  return {
    values: [
      count,
      absent('dwell', 'ms', reason),
      absent('level_low', signal.unit, reason),
      absent('level_high', signal.unit, reason),
      absent('active_state', '1', reason),
    ],
    notices:
      level === null
        ? []
        : [
            flatLine(
              signal.axis,
              inWords(level, signal.unit),
              'no command from the control unit (no crank signal, immobiliser, fuse, ground), a broken or shorted wire',
            ),
          ],
  };
}
