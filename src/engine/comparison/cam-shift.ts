import type { CamShift, Row } from './types.ts';

/** Edges whose shifts lie this near to their mean moved alike: timing, not the cam wheel. */
const ALIKE_DEG = 1.5;
/** A shift below this is fitting play. Common practice, no source; a tooth of the belt is 15 to 20 degrees. */
export const PLAY_DEG = 2;

/** The shifts of a cam's edges against the reference, from the table's rows. */
export const edgeShifts = (rows: readonly Row[]): number[] =>
  rows.flatMap((row) =>
    (row.key === 'cam_rising_angles' || row.key === 'cam_falling_angles') &&
    typeof row.here === 'number' &&
    typeof row.reference === 'number'
      ? [row.here - row.reference]
      : [],
  );

/**
 * How far the cam lies from the reference, when at least two edges moved alike, else null. One tooth of the belt or chain is
 * 360 / teeth of the crank's sprocket (arithmetic: the crank's sprocket turns once a turn).
 */
export function camShiftOf(rows: readonly Row[], sprocketTeeth: number | null): CamShift | null {
  const shifts = edgeShifts(rows);
  if (shifts.length < 2) return null;
  const deg = shifts.reduce((sum, shift) => sum + shift, 0) / shifts.length;
  if (!shifts.every((shift) => Math.abs(shift - deg) <= ALIKE_DEG)) return null;
  const teeth = sprocketTeeth === null ? null : (deg * sprocketTeeth) / 360;
  return { deg, edges: shifts.length, teeth, sprocketTeeth };
}
