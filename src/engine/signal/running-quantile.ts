/**
 * Quantile `q` (lower order statistic at `q · (width − 1)`) of the `2 · arm + 1` numbers about each place; at the ends
 * the window stays whole and stands still. A short sorted list is kept up by insertion: no sorting at every place.
 * Fewer numbers than the window: the quantile of all of them everywhere. No NaN.
 */
export function runningQuantile(values: Float64Array, arm: number, q: number): Float64Array<ArrayBuffer> {
  const n = values.length;
  const width = Math.min(n, 2 * arm + 1);
  const out = new Float64Array(n);
  if (n === 0) return out;
  const sorted = values.slice(0, width).sort();
  const rank = Math.floor((width - 1) * q);
  let from = 0;
  for (let k = 0; k < n; k += 1) {
    const wanted = Math.min(Math.max(0, k - arm), n - width);
    if (wanted > from) {
      replace(sorted, values[from]!, values[from + width]!);
      from = wanted;
    }
    out[k] = sorted[rank]!;
  }
  return out;
}

/** Takes `old` out of the sorted list and puts `fresh` in. */
function replace(sorted: Float64Array, old: number, fresh: number): void {
  let k = 0;
  while (sorted[k] !== old) k += 1;
  while (k + 1 < sorted.length && sorted[k + 1]! < fresh) {
    sorted[k] = sorted[k + 1]!;
    k += 1;
  }
  while (k > 0 && sorted[k - 1]! > fresh) {
    sorted[k] = sorted[k - 1]!;
    k -= 1;
  }
  sorted[k] = fresh;
}
