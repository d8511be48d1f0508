import type { Findings } from '../capture.ts';
import { rangeMedian } from '../signal/range.ts';
import { timeAt } from '../signal/time.ts';
import { absent, type Value } from '../value.ts';
import { bounded } from './events/bounded.ts';
import { flatLine } from './events/flat-line.ts';
import { inWords } from './events/in-words.ts';
import { humNotice, mainsHumOnly } from './events/mains-hum.ts';
import { oncePerEvent } from './events/once-per-event.ts';
import { stretch, whole } from './events/whole.ts';
import { injectorNotices } from './injector-voltage/notices.ts';
import { injectorPulse } from './injector-voltage/pulse.ts';
import { upsideDownNotice } from './switched-load/input-notices.ts';
import { onPeriods } from './switched-load/on-periods.ts';
import { outsideLevel } from './switched-load/outside-level.ts';
import { pointsDown } from './switched-load/points-down.ts';
import { type LoadStates, loadStates } from './switched-load/states.ts';
import { isSteady } from './switched-load/steady.ts';
import type { MeasuredSignal } from './types.ts';

/** A pulse is longer than a spike of pick-up; a chopped hold releases for less than this. Common practice, no source. */
const SHORTEST_PULSE_S = 0.1e-3;
const CHOPPED_S = 0.4e-3;

/**
 * The switched side of a fuel injector against battery negative: feed, pulse (mesial to mesial), the spike at switch-off and
 * the small hump in its decay as the needle seats.
 */
export function measureInjectorVoltage(signal: MeasuredSignal): Findings {
  const { values, axis } = signal;
  const states = loadStates(values);
  if (!states) return noPulse(signal, null, 'no samples to measure');
  if (pointsDown(values, states.noise)) {
    return { ...noPulse(signal, null, 'the trace is upside down'), notices: [upsideDownNotice(axis)] };
  }
  const hum = mainsHumOnly(values, axis);
  if (hum && !isSteady(values, states)) {
    return {
      ...noPulse(signal, states, 'nothing but mains hum in the capture', true),
      notices: [humNotice(axis, hum, signal.unit)],
    };
  }
  if (states.on === null) return noPulse(signal, states, 'no pulse in the capture');
  const both = { ...states, on: states.on };
  const periods = onPeriods(values, axis, both, { shortestS: SHORTEST_PULSE_S, bridgeS: CHOPPED_S });
  if (periods.length === 0) return noPulse(signal, states, 'no pulse in the capture');
  const pulses = periods.map((on, k) =>
    injectorPulse(values, axis, both, on, Math.floor(periods[k + 1]?.start ?? values.length)),
  );
  const complete = pulses.flatMap((pulse) => {
    const { start, end } = pulse.on;
    return start === null || end === null ? [] : [{ ...pulse, start, end }];
  });
  const level = (value: Value): Value =>
    states.acCoupled
      ? absent(value.key, value.unit, 'the input seems AC-coupled: levels mean nothing')
      : value;
  const none = 'no pulse with both edges in the capture';
  const outside = outsideLevel(
    values,
    axis,
    pulses.map(({ on, over }) => ({ from: on.start ?? 0, to: over })),
  );
  const part = ({ start, end }: { start: number; end: number }) => stretch(axis, start, end);
  return {
    values: [
      { key: 'pulse_count', value: complete.length, unit: '1', evidence: bounded(complete.map(part)) },
      oncePerEvent(
        'pulse_width',
        'ms',
        complete.map((pulse) => ({
          value: (timeAt(axis, pulse.end) - timeAt(axis, pulse.start)) * 1000,
          evidence: part(pulse),
        })),
        none,
      ),
      level(
        oncePerEvent(
          'clamp_peak',
          'V',
          pulses
            .filter((pulse) => pulse.on.end !== null)
            .map(({ clamp, on, over }) => ({
              value: clamp?.peak ?? null,
              evidence: clamp
                ? stretch(axis, clamp.at - 1, clamp.at + 1)
                : stretch(axis, on.end ?? over, over),
            })),
          'no spike at switch-off',
        ),
      ),
      level(
        outside.level === null
          ? absent('supply_level', 'V', 'no quiet stretch between the pulses')
          : { key: 'supply_level', value: outside.level, unit: 'V', evidence: bounded(outside.evidence) },
      ),
      level(
        oncePerEvent(
          'on_level',
          'V',
          complete.map((pulse) => {
            const inner = 0.1 * (pulse.end - pulse.start);
            return {
              value: pulse.on.chopped ? null : rangeMedian(values, pulse.start + inner, pulse.end - inner),
              evidence: stretch(axis, pulse.start + inner, pulse.end - inner),
            };
          }),
          complete.length > 0 ? 'the driver chops, so there is no one level' : none,
        ),
      ),
      oncePerEvent(
        'hump_time',
        'ms',
        pulses
          .filter((pulse) => pulse.on.end !== null)
          .map(({ hump, on, over }) => ({
            value: hump ? (hump.atS - timeAt(axis, on.end ?? over)) * 1000 : null,
            evidence: stretch(axis, on.end ?? over, over),
          })),
        'no hump stands out from the decay',
      ),
    ],
    notices: injectorNotices(signal, both, pulses),
  };
}

function noPulse(signal: MeasuredSignal, states: LoadStates | null, reason: string, calm = false): Findings {
  const steady = calm || (states !== null && isSteady(signal.values, states));
  const why = steady || !states ? reason : 'the trace moves, but shows no time with the driver on';
  const level = steady ? rangeMedian(signal.values, 0, signal.values.length) : null;
  return {
    values: [
      steady
        ? { key: 'pulse_count', value: 0, unit: '1', evidence: whole(signal.axis) }
        : absent('pulse_count', '1', why),
      absent('pulse_width', 'ms', why),
      absent('clamp_peak', 'V', why),
      level === null
        ? absent('supply_level', 'V', why)
        : { key: 'supply_level', value: level, unit: 'V', evidence: whole(signal.axis) },
      absent('on_level', 'V', why),
      absent('hump_time', 'ms', why),
    ],
    notices:
      level === null
        ? []
        : [
            flatLine(
              signal.axis,
              inWords(level, 'V'),
              'at feed voltage the control unit never pulls the injector low (no crank or cam signal, clear-flood mode, immobiliser, driver); near zero the feed is missing, ' +
                'the winding is open, or the driver holds it down all the time',
            ),
          ],
  };
}
