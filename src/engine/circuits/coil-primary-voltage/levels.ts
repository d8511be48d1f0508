import { fitLine } from '../../signal/line-fit.ts';
import { rangeMedian, sortedRange } from '../../signal/range.ts';
import { indexAtOrAfter, timeAt } from '../../signal/time.ts';
import type { Evidence } from '../../value.ts';
import type { Observation } from '../events/once-per-event.ts';
import { stretch } from '../events/whole.ts';
import type { OnPeriod } from '../switched-load/on-periods.ts';
import type { CoilTrace, Firing } from './firing.ts';

const SETTLING_S = 0.2e-3;

/** Median of the samples outside events (driver on, kick, burn, ring), and where they are; null when there are none. */
export function supplyLevel(
  trace: CoilTrace,
  periods: readonly OnPeriod[],
  firings: readonly Firing[],
): { readonly level: number | null; readonly evidence: readonly Evidence[] } {
  const { values, axis } = trace;
  const parts: Array<readonly [number, number]> = [];
  let from = 0;
  for (const period of periods) {
    const to = Math.floor(period.start ?? 0) - 1;
    if (to - from > 2) parts.push([from, to]);
    const firing = firings.find((one) => one.on.end === period.end);
    const over = firing?.over ?? (period.end === null ? values.length : Math.ceil(period.end));
    from = indexAtOrAfter(axis, timeAt(axis, Math.min(over, values.length - 1)) + SETTLING_S);
  }
  if (values.length - from > 2) parts.push([from, values.length]);
  const total = parts.reduce((sum, [a, b]) => sum + b - a, 0);
  const step = Math.max(1, Math.ceil(total / 200_000));
  const kept = new Float32Array(Math.ceil(total / step) + parts.length);
  let count = 0;
  for (const [a, b] of parts) for (let i = a; i < b; i += step) kept[count++] = values[i]!;
  return {
    level: rangeMedian(kept, 0, count),
    evidence: parts.map(([a, b]) => stretch(axis, a, b - 1)),
  };
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
