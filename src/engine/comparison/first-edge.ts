import { crossings } from '../signal/crossings.ts';
import { stateLevels } from '../signal/levels.ts';
import { timeAt } from '../signal/time.ts';
import type { Side } from './types.ts';

/** Otsu's ratio from which a signal counts as one of two levels (see `stateLevels`). */
const TWO_LEVELS = 0.9;

/** Times of the rising mesial crossings, seconds; empty when the signal has no two levels. */
export function risingEdgesS(side: Pick<Side, 'axis' | 'values'>): number[] {
  const levels = stateLevels(side.values);
  if (!levels || levels.bimodality < TWO_LEVELS) return [];
  const steps = side.axis.kind === 'uneven' && side.axis.holds;
  const found = crossings(side.values, {
    level: levels.mesial,
    hysteresis: (levels.high - levels.low) / 4,
    ...(steps ? { holds: true } : {}),
  });
  const times: number[] = [];
  for (let k = 0; k < found.count; k++) if (found.rising[k]) times.push(timeAt(side.axis, found.at[k]!));
  return times;
}

export const firstRisingEdgeS = (side: Side): number | null => risingEdgesS(side)[0] ?? null;
