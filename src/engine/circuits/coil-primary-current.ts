import type { Findings } from '../capture.ts';
import { timeAt } from '../signal/time.ts';
import { absent, type Value } from '../value.ts';
import { type ChargeShape, chargeShape } from './coil-primary-current/charge-shape.ts';
import { findCharges } from './coil-primary-current/charges.ts';
import { currentLimited } from './coil-primary-current/current-limited.ts';
import { currentNotices } from './coil-primary-current/notices.ts';
import { currentTrace } from './coil-primary-current/trace.ts';
import { bounded } from './events/bounded.ts';
import { flatLine } from './events/flat-line.ts';
import { inWords } from './events/in-words.ts';
import { humNotice, mainsHumOnly } from './events/mains-hum.ts';
import { type Observation, oncePerEvent } from './events/once-per-event.ts';
import { whole } from './events/whole.ts';
import type { MeasuredSignal } from './types.ts';

const NO_EVENT = 'no switch-off in the capture';

/**
 * Current through an ignition coil's primary, from a clamp: each charge is an L/R curve that ends at the switch-off. The
 * zero of the clamp is taken off, and a clamp put on the wrong way round is turned.
 */
export function measureCoilPrimaryCurrent(signal: MeasuredSignal): Findings {
  const trace = currentTrace(signal.values, signal.axis);
  if (!trace) return nothing('no samples to measure', null);
  const hum = mainsHumOnly(signal.values, signal.axis);
  if (hum) {
    return {
      ...nothing('nothing but mains hum in the capture', whole(signal.axis)),
      notices: [humNotice(signal.axis, hum, signal.unit)],
    };
  }
  const charges = trace.top > 8 * trace.noise && trace.top > 0 ? findCharges(trace) : [];
  if (charges.length === 0) {
    const calm = trace.top <= 8 * trace.noise;
    return {
      ...nothing(NO_EVENT, calm ? whole(signal.axis) : null),
      notices: calm
        ? [
            flatLine(
              signal.axis,
              inWords(trace.zero, signal.unit),
              'no feed, an open winding, a driver that never switches on, the wrong wire, or a clamp that is off or open',
            ),
          ]
        : [],
    };
  }
  const shapes = charges.map((charge) => chargeShape(trace, charge));
  const unit = signal.unit;
  const part = ({ startS, endS, charge }: ChargeShape) => ({
    from: startS ?? timeAt(signal.axis, charge.first ?? 0),
    to: endS,
  });
  const each = (of: (shape: ChargeShape) => number | null): Observation[] =>
    shapes.map((shape) => ({ value: of(shape), evidence: part(shape) }));
  const judged = shapes.filter((shape) => shape.charge.first !== null);
  const noStart =
    judged.length > 0
      ? 'the steps of the input are too coarse for the start of the rise'
      : 'no charge is in the capture from its start';
  const limited = currentLimited(judged);
  const values: Value[] = [
    { key: 'firing_count', value: shapes.length, unit: '1', evidence: bounded(shapes.map(part)) },
    oncePerEvent(
      'dwell',
      'ms',
      each(({ startS, endS }) => (startS === null ? null : (endS - startS) * 1000)),
      noStart,
    ),
    oncePerEvent(
      'peak_current',
      unit,
      each((shape) => shape.peak),
      NO_EVENT,
    ),
    limited === null
      ? absent(
          'current_limited',
          '1',
          judged.length === 0 ? noStart : 'noise hides whether the end of the rise is within 1 %',
          bounded(judged.map(part)),
        )
      : {
          key: 'current_limited',
          value: limited,
          unit: '1',
          n: judged.length,
          evidence: bounded(judged.map(part)),
        },
    oncePerEvent(
      'time_constant',
      'ms',
      each(({ timeConstantS }) => (timeConstantS === null ? null : timeConstantS * 1000)),
      'the rise is too straight, too short or too rough to tell the time constant',
    ),
  ];
  return { values, notices: currentNotices(signal, trace, shapes) };
}

function nothing(reason: string, calm: ReturnType<typeof whole> | null): Findings {
  return {
    values: [
      calm
        ? { key: 'firing_count', value: 0, unit: '1', evidence: calm }
        : absent('firing_count', '1', reason),
      absent('dwell', 'ms', reason),
      absent('peak_current', 'A', reason),
      absent('current_limited', '1', reason),
      absent('time_constant', 'ms', reason),
    ],
    notices: [],
  };
}
