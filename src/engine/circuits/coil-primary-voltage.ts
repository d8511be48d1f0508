import type { Findings } from '../capture.ts';
import { timeAt } from '../signal/time.ts';
import { absent, type Notice, type Value } from '../value.ts';
import { findFirings } from './coil-primary-voltage/firings.ts';
import { onLevel, onLevelSlope, supplyLevel } from './coil-primary-voltage/levels.ts';
import { missedFirings } from './coil-primary-voltage/missed-firings.ts';
import { noEvent } from './coil-primary-voltage/no-event.ts';
import { coilNotices } from './coil-primary-voltage/notices.ts';
import { bounded } from './events/bounded.ts';
import { humNotice, mainsHumOnly } from './events/mains-hum.ts';
import { type Observation, oncePerEvent } from './events/once-per-event.ts';
import { stretch, whole } from './events/whole.ts';
import { acCoupledNotice, upsideDownNotice } from './switched-load/input-notices.ts';
import { onPeriods } from './switched-load/on-periods.ts';
import { pointsDown } from './switched-load/points-down.ts';
import { loadStates } from './switched-load/states.ts';
import { isSteady } from './switched-load/steady.ts';
import type { MeasuredSignal } from './types.ts';

/** Half swings of a ringing coil are shorter. Common practice (dwell 2 to 6 ms), no source. */
const SHORTEST_DWELL_S = 0.2e-3;
/** No 12 V or 24 V feed is higher; a level above it is a burn line taken for the feed. Common practice, no source. */
const HIGHEST_FEED_V = 32;

/**
 * The switched side of an ignition coil against battery negative: feed, driver on (dwell), switch-off kick, burn line, ring.
 * Everything is judged against the swing between feed and on level, so a forgotten probe factor changes no time.
 */
export function measureCoilPrimaryVoltage(signal: MeasuredSignal): Findings {
  const { values, axis } = signal;
  const states = loadStates(values);
  if (!states) return noEvent(signal, null, 'no samples to measure');
  if (pointsDown(values, states.noise)) {
    return { ...noEvent(signal, null, 'the trace is upside down'), notices: [upsideDownNotice(axis)] };
  }
  const hum = mainsHumOnly(values, axis);
  if (hum && !isSteady(values, states)) {
    return {
      ...noEvent(signal, states, 'nothing but mains hum in the capture', true),
      notices: [humNotice(axis, hum, signal.unit)],
    };
  }
  if (states.on === null) return noEvent(signal, states, 'no switch-off in the capture');
  if (states.rest > HIGHEST_FEED_V) {
    return noEvent(signal, null, 'the feed cannot be told from the burn line; record a longer stretch');
  }
  const trace = { values, axis, states: { ...states, on: states.on } };
  const periods = onPeriods(values, axis, trace.states, { shortestS: SHORTEST_DWELL_S });
  if (periods.length === 0) return noEvent(signal, states, 'no switch-off in the capture');
  const firings = findFirings(trace, periods, signal.rail?.high ?? null);

  const offS = firings.map((firing) => timeAt(axis, firing.on.end));
  const intervalsS = offS.slice(1).map((at, k) => at - offS[k]!);
  const eventEvidence = firings.map((firing) => stretch(axis, firing.on.start ?? 0, firing.over));
  const missed = missedFirings(intervalsS);
  const supply = supplyLevel(trace, periods, firings);
  const level = (value: Value): Value =>
    states.acCoupled
      ? absent(value.key, value.unit, 'the input seems AC-coupled: levels mean nothing')
      : value;
  const none = 'no complete event in the capture';

  const values_: Value[] = [
    { key: 'firing_count', value: firings.length, unit: '1', evidence: bounded(eventEvidence) },
    oncePerEvent(
      'firing_interval',
      'ms',
      intervalsS.map((gap, k) => ({ value: gap * 1000, evidence: { from: offS[k]!, to: offS[k + 1]! } })),
      'fewer than two switch-offs',
    ),
    oncePerEvent(
      'dwell',
      'ms',
      firings.map(({ on }) => ({
        value: on.start === null ? null : (timeAt(axis, on.end) - timeAt(axis, on.start)) * 1000,
        evidence: stretch(axis, on.start ?? 0, on.end),
      })),
      none,
    ),
    level(
      supply.level === null
        ? absent('supply_level', 'V', 'no quiet stretch between the events')
        : { key: 'supply_level', value: supply.level, unit: 'V', evidence: bounded(supply.evidence) },
    ),
    level(
      oncePerEvent(
        'on_level',
        'V',
        firings.map(({ on }) => onLevel(trace, on)),
        none,
      ),
    ),
    oncePerEvent(
      'on_level_slope',
      'V/ms',
      firings.map(({ on }) => onLevelSlope(trace, on)),
      none,
    ),
    level(
      oncePerEvent(
        'kick_peak',
        'V',
        firings.map(({ on, kick }) => ({
          value: kick?.peak ?? null,
          evidence: kick ? stretch(axis, kick.from - 1, kick.to + 1) : stretch(axis, on.end - 1, on.end + 2),
        })),
        firings.length === 0 ? none : 'no kick at switch-off',
      ),
    ),
    oncePerEvent(
      'burn_time',
      'ms',
      firings.map(({ on, burn, over }) => ({
        value: burn && burn.end !== null ? (timeAt(axis, burn.end) - timeAt(axis, burn.start)) * 1000 : null,
        evidence: burn ? stretch(axis, burn.start, burn.end ?? over) : stretch(axis, on.end, over),
      })),
      firings.some((firing) => firing.burn) ? 'the capture ends during the burn' : 'no burn line',
    ),
    level(
      oncePerEvent(
        'burn_level',
        'V',
        firings.map(({ on, burn, over }) => ({
          value: burn?.end != null ? burn.level : null,
          evidence: burn ? stretch(axis, burn.start, burn.end ?? over) : stretch(axis, on.end, over),
        })),
        firings.some((firing) => firing.burn) ? 'the capture ends during the burn' : 'no burn line',
      ),
    ),
    ringCount(
      firings.map(({ burn, kick, rings, over }) => ({
        value: rings,
        evidence: stretch(axis, burn?.end ?? kick?.to ?? over, over),
      })),
    ),
    missed === null
      ? absent('missed_firings', '1', 'fewer than three ordinary intervals')
      : { key: 'missed_firings', value: missed, unit: '1', n: intervalsS.length, evidence: whole(axis) },
  ];
  const notices: Notice[] = states.acCoupled ? [acCoupledNotice(axis)] : [];
  return { values: values_, notices: [...notices, ...coilNotices(signal, trace, firings, missed)] };
}

/** Rings of one coil are alike: where most of them cannot be counted for sure, the others say too little. */
function ringCount(rings: readonly Observation[]): Value {
  const told = rings.filter(({ value }) => value !== null).length;
  return 2 * told >= rings.length && told > 0
    ? oncePerEvent('ring_count', '1', rings, '')
    : absent(
        'ring_count',
        '1',
        'no ring is seen to its end, or its last extremes stand at the limit of 4 × the noise',
        bounded(rings.map((one) => one.evidence)),
      );
}
