import { spread } from '../../signal/statistics.ts';
import { absent, type Evidence, type Value } from '../../value.ts';
import { bounded } from './bounded.ts';

/** What one event gives: its number (null when this event does not show it) and the samples it was read from. */
export interface Observation {
  readonly value: number | null;
  readonly evidence: Evidence;
}

/** Mean over the events that show the quantity, with n, ends and spread; none: null with `reason`. */
export function oncePerEvent(
  key: string,
  unit: string,
  observations: readonly Observation[],
  reason: string,
): Value {
  const shown = observations.filter((one) => one.value !== null && Number.isFinite(one.value));
  const statistics = spread(shown.map((one) => one.value as number));
  if (!statistics) return absent(key, unit, reason, bounded(observations.map((one) => one.evidence)));
  const { n, mean, min, max, sd } = statistics;
  return { key, value: mean, unit, n, min, max, sd, evidence: bounded(shown.map((one) => one.evidence)) };
}
