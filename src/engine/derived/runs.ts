/** Stretches without a hole: [from, to), in order. */
export function runsOf(values: Float32Array): [from: number, to: number][] {
  const runs: [number, number][] = [];
  let from = -1;
  for (let i = 0; i <= values.length; i += 1) {
    const hole = i === values.length || Number.isNaN(values[i]!);
    if (!hole && from < 0) from = i;
    if (hole && from >= 0) {
      runs.push([from, i]);
      from = -1;
    }
  }
  return runs;
}
