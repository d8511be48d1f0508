import { findCamPattern } from './cam-pattern.ts';
import { findGapPattern } from './gap-pattern.ts';
import type { PatternResult } from './pattern.ts';
import { findSpacingPattern } from './spacing-pattern.ts';
import { findWidthPattern } from './width-pattern.ts';

/**
 * The trigger wheel in a train of tooth events: an even division with gaps or an added tooth; else wide and narrow
 * pulses; else unequal spacing; and where none of these marks a turn, the count against a cam signal.
 *
 * @param widths pulse width of each event as a share of the local tooth period, for two-level signals.
 * @param camEdgesS edges of one direction of a cam signal in the same capture.
 */
export function findPattern(
  timesS: Float64Array,
  widths: Float64Array | null,
  camEdgesS: Float64Array | null,
): PatternResult {
  const gaps = findGapPattern(timesS);
  if (gaps.ok) return gaps;
  if (widths) {
    const pulses = findWidthPattern(timesS, widths);
    if (pulses.ok) return pulses;
  }
  const spacing = gaps.evenly ? null : findSpacingPattern(timesS);
  if (spacing?.ok) return spacing;
  if (camEdgesS && camEdgesS.length > 1) {
    const withCam = findCamPattern(timesS, camEdgesS);
    if (withCam.ok) return withCam;
  }
  if (spacing && !spacing.ok && spacing.reason.includes('cam')) return spacing;
  return gaps;
}
