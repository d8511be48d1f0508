/** The limits of an input in the signal's unit; null where the file names none. */
export interface Rail {
  readonly low: number | null;
  readonly high: number | null;
}

/** Samples are float32 and the rail a double: they count as equal within the rounding of the sample. */
const roundingOf = (rail: number) => Math.max(Math.abs(rail) * 1e-6, 1e-12);

/** Whether `value` is at or above the highest number that the input can give; false where that is not known. */
export function atHighRail(value: number, rail: Rail | null): boolean {
  return rail?.high != null && value >= rail.high - roundingOf(rail.high);
}

/** Whether `value` is at or below the lowest number that the input can give; false where that is not known. */
export function atLowRail(value: number, rail: Rail | null): boolean {
  return rail?.low != null && value <= rail.low + roundingOf(rail.low);
}
