import { fitLine } from '../../signal/line-fit.ts';
import { rangeMedian, sortedRange } from '../../signal/range.ts';
import type { Observation } from '../events/once-per-event.ts';
import { stretch } from '../events/whole.ts';
import type { OnPeriod } from '../switched-load/on-periods.ts';
import { outsideLevel } from '../switched-load/outside-level.ts';
import type { CoilTrace, Firing } from './firing.ts';

/** Median of the samples outside events (driver on, kick, burn, ring), and where they are; null when there are none. */
export function supplyLevel(trace: CoilTrace, periods: readonly OnPeriod[], firings: readonly Firing[]) {
  const { values, axis } = trace;
  const events = periods.map((period) => ({
    from: period.start ?? 0,
    to: firings.find((one) => one.on.end === period.end)?.over ?? values.length,
  }));
  return outsideLevel(values, axis, events);
}

/** Median from 10 to 90 % of one driver-on time that is wholly in the capture. */
export function onLevel(trace: CoilTrace, on: OnPeriod): Observation {
  const [from, to] = inner(on);
  const sorted = on.start === null ? new Float32Array() : sortedRange(trace.values, from, to);
  const value = sorted.length > 0 ? rangeMedian(sorted, 0, sorted.length) : null;
  return { value, evidence: stretch(trace.axis, from, to) };
}

/** Slope of the on level over the same part, volts a millisecond; a driver that limits its current makes it steep at the end. */
export function onLevelSlope(trace: CoilTrace, on: OnPeriod): Observation {
  const [from, to] = inner(on);
  const line = on.start === null ? null : fitLine(trace.values, trace.axis, from, to);
  return { value: line ? line.slope / 1000 : null, evidence: stretch(trace.axis, from, to) };
}

function inner(on: OnPeriod): readonly [number, number] {
  const start = on.start ?? 0;
  const end = on.end ?? start;
  return [start + 0.1 * (end - start), start + 0.9 * (end - start)];
}
