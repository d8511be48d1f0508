import { extent } from '../../signal/levels.ts';
import { atHighRail, atLowRail } from '../../signal/rail.ts';
import type { Notice } from '../../value.ts';
import type { MeasuredSignal } from '../types.ts';
import { inWords } from './in-words.ts';
import { whole } from './whole.ts';

/** The trace reaches a limit of the input that the file names: what that costs, in `loss` (a clause). */
export function clippedNotices(signal: MeasuredSignal, loss: string): Notice[] {
  const { rail, unit, axis, values } = signal;
  const ends = rail ? extent(values) : null;
  if (!ends || !rail) return [];
  const hit = [
    atHighRail(ends.highest, rail) ? inWords(rail.high!, unit) : null,
    atLowRail(ends.lowest, rail) ? inWords(rail.low!, unit) : null,
  ].filter((one) => one !== null);
  if (hit.length === 0) return [];
  return [
    {
      code: 'clipped',
      severity: 'watch',
      text: `The trace reaches the limit of the input (${hit.join(' and ')}). What lies beyond was not recorded: ${loss}. Use a wider range.`,
      evidence: whole(axis),
    },
  ];
}
