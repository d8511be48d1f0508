const CYCLE = 720;

/** Signed smallest difference a − b of two angles of a 720 degree cycle, in (−360, 360]. */
export function circularDifference(a: number, b: number): number {
  const raw = (((a - b) % CYCLE) + CYCLE) % CYCLE;
  return raw > CYCLE / 2 ? raw - CYCLE : raw;
}

/**
 * Pairs the angles of two lists of one length: the rotation of the first that lies nearest to the second. A cam that
 * slipped past the mark begins its list with another edge, or counts its cycle from the other mark (360 degrees on); both
 * are undone here. Null when the lists have different lengths or are empty.
 * @returns for each reference angle the angle here (0 to 720, in the reference's own cycle) and the difference.
 */
export function pairAngles(
  here: readonly number[],
  reference: readonly number[],
): { readonly here: number; readonly reference: number; readonly difference: number }[] | null {
  const n = reference.length;
  if (n === 0 || here.length !== n) return null;
  let best: { rotation: number; turn: number; cost: number } | null = null;
  for (const turn of [0, 360]) {
    for (let rotation = 0; rotation < n; rotation++) {
      let cost = 0;
      for (let i = 0; i < n; i++)
        cost += Math.abs(circularDifference(here[(i + rotation) % n]! + turn, reference[i]!));
      if (best === null || cost < best.cost - 1e-9) best = { rotation, turn, cost };
    }
  }
  return reference.map((angle, i) => {
    const difference = circularDifference(here[(i + best!.rotation) % n]! + best!.turn, angle);
    return { here: (angle + difference + CYCLE) % CYCLE, reference: angle, difference };
  });
}
