import { median } from '../../signal/statistics.ts';

/** Intervals within this share of the ordinary one are ordinary. */
const ORDINARY = 0.3;
/** An engine that runs up shortens its intervals by less than this from one to the next. Common practice, no source. */
const RUN_UP = 1.6;

/**
 * Firings that should have come between those seen: the sum over gaps of round(gap / ordinary interval) − 1, the ordinary
 * interval being the median. null with fewer than three ordinary intervals. Long intervals at the start that shorten step
 * by step into the ordinary one are the engine running up, not gaps.
 */
export function missedFirings(intervalsS: readonly number[]): number | null {
  const ordinary = median(intervalsS);
  if (ordinary === null || !(ordinary > 0)) return null;
  const ordinaryOnes = intervalsS.filter((gap) => Math.abs(gap / ordinary - 1) <= ORDINARY);
  if (ordinaryOnes.length < 3) return null;
  let settled = 0;
  while (
    settled + 1 < intervalsS.length &&
    intervalsS[settled]! > (1 + ORDINARY) * ordinary &&
    intervalsS[settled]! / intervalsS[settled + 1]! < RUN_UP
  ) {
    settled += 1;
  }
  return intervalsS.slice(settled).reduce((sum, gap) => sum + Math.max(0, Math.round(gap / ordinary) - 1), 0);
}
