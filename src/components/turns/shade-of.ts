/**
 * How dark a cell is, 0 to 1, for the values that fall into it: that of its value farthest from half-way of the scale, so that
 * one short spike or one weak swing is not averaged away. Null for a cell without a value.
 */
export function shadeOf(lowest: number, highest: number, low: number, high: number): number | null {
  if (Number.isNaN(lowest) || Number.isNaN(highest) || !(high > low)) return null;
  const middle = (low + high) / 2;
  const value = Math.abs(highest - middle) >= Math.abs(lowest - middle) ? highest : lowest;
  return Math.min(Math.max((value - low) / (high - low), 0), 1);
}
