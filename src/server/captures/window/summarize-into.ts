/**
 * First, lowest and highest in the order of time in which they occur, and last of `values[from]` up to `values[to]`, written
 * to `into[at]` and the three after it. Holes are skipped; nothing but holes gives four NaN. Gives false when there was none.
 * The same rule as `engine/signal/pyramid.ts`, on a buffer that is filled column by column.
 */
export function summarizeInto(
  values: Float32Array,
  from: number,
  to: number,
  into: Float32Array,
  at: number,
): boolean {
  let i = from;
  while (i < to && Number.isNaN(values[i])) i += 1;
  if (i >= to) {
    into.fill(Number.NaN, at, at + 4);
    return false;
  }
  const first = values[i]!;
  let lowest = first;
  let highest = first;
  let last = first;
  let lowestAt = i;
  let highestAt = i;
  for (i += 1; i < to; i += 1) {
    const value = values[i]!;
    if (value < lowest) {
      lowest = value;
      lowestAt = i;
    } else if (value > highest) {
      highest = value;
      highestAt = i;
    } else if (Number.isNaN(value)) continue;
    last = value;
  }
  into[at] = first;
  into[at + 1] = lowestAt <= highestAt ? lowest : highest;
  into[at + 2] = lowestAt <= highestAt ? highest : lowest;
  into[at + 3] = last;
  return true;
}
