import type { Evidence } from '../../value.ts';

const MOST = 50;

/** At most 50 stretches, spread evenly over the list, first and last kept: a long capture must not make a long answer. */
export function bounded(evidence: readonly Evidence[]): readonly Evidence[] {
  if (evidence.length <= MOST) return evidence;
  return Array.from(
    { length: MOST },
    (_, k) => evidence[Math.round((k * (evidence.length - 1)) / (MOST - 1))]!,
  );
}
