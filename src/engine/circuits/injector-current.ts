import type { Findings } from '../capture.ts';
import { absent, type Notice } from '../value.ts';
import { findCharges } from './coil-primary-current/charges.ts';
import { currentTrace } from './coil-primary-current/trace.ts';
import { bounded } from './events/bounded.ts';
import { clippedNotices } from './events/clipped.ts';
import { flatLine } from './events/flat-line.ts';
import { inWords } from './events/in-words.ts';
import { humNotice, mainsHumOnly } from './events/mains-hum.ts';
import { type Observation, oncePerEvent } from './events/once-per-event.ts';
import { whole } from './events/whole.ts';
import { type InjectorCurrentPulse, pulseShape } from './injector-current/pulse-shape.ts';
import type { MeasuredSignal } from './types.ts';

/** A hold is a quarter of the peak (TI LM1949: 3.85 A and 0.94 A); half of that tells it from nothing. */
const HOLD_SHARE = 0.12;

const NONE = 'no pulse with both ends in the capture';

/**
 * Current through an injector from a clamp, its zero taken off: the pulse from the first current to the start of the fall, its peak,
 * the level it is held at, and the dent that the moving needle leaves in the rise.
 */
export function measureInjectorCurrent(signal: MeasuredSignal): Findings {
  const { axis, unit } = signal;
  const trace = currentTrace(signal.values, axis);
  if (!trace) return nothing(signal, 'no samples to measure', null);
  const hum = mainsHumOnly(signal.values, axis);
  if (hum) {
    return {
      ...nothing(signal, 'nothing but mains hum in the capture', trace.zero),
      notices: [humNotice(axis, hum, unit)],
    };
  }
  if (!(trace.top > 8 * trace.noise)) return nothing(signal, 'no pulse in the capture', trace.zero);
  const pulses = findCharges(trace, HOLD_SHARE).map((charge) => pulseShape(trace, charge));
  const complete = pulses.flatMap((pulse) =>
    pulse.startS === null ? [] : [{ ...pulse, startS: pulse.startS }],
  );
  const each = (of: (pulse: InjectorCurrentPulse & { startS: number }) => number | null): Observation[] =>
    complete.map((pulse) => ({ value: of(pulse), evidence: { from: pulse.startS, to: pulse.endS } }));
  const notices: Notice[] = clippedNotices(signal, 'the peak is a lower bound');
  if (trace.reversed) {
    notices.push({
      code: 'clamp-reversed',
      severity: 'info',
      text: 'The current points down: the clamp sits the other way round on the wire. It is measured as if turned; amperes are given as positive.',
      evidence: whole(axis),
    });
  }
  return {
    values: [
      {
        key: 'pulse_count',
        value: complete.length,
        unit: '1',
        evidence: bounded(complete.map(({ startS, endS }) => ({ from: startS, to: endS }))),
      },
      oncePerEvent(
        'pulse_width',
        'ms',
        each(({ startS, endS }) => (endS - startS) * 1000),
        NONE,
      ),
      oncePerEvent(
        'peak_current',
        unit,
        each(({ peak }) => peak),
        complete.length > 0 ? 'the peak lies between samples; record at a higher rate' : NONE,
      ),
      oncePerEvent(
        'hold_current',
        unit,
        each(({ hold }) => hold),
        complete.length > 0 ? 'the current is not brought down to a hold' : NONE,
      ),
      oncePerEvent(
        'hump_time',
        'ms',
        each(({ dentS, startS }) => (dentS === null ? null : (dentS - startS) * 1000)),
        complete.length > 0 ? 'no dent stands out in the rise' : NONE,
      ),
    ],
    notices,
  };
}

function nothing(signal: MeasuredSignal, reason: string, level: number | null): Findings {
  return {
    values: [
      level === null
        ? absent('pulse_count', '1', reason)
        : { key: 'pulse_count', value: 0, unit: '1', evidence: whole(signal.axis) },
      absent('pulse_width', 'ms', reason),
      absent('peak_current', signal.unit, reason),
      absent('hold_current', signal.unit, reason),
      absent('hump_time', 'ms', reason),
    ],
    notices:
      level === null
        ? []
        : [
            flatLine(
              signal.axis,
              inWords(level, signal.unit),
              'the control unit never switches the injector on, feed or winding is open, or the clamp is off, open or on another wire',
            ),
          ],
  };
}
