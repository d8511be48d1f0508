/**
 * A three-wire sensor's output: high inside any of the stretches (degrees of a period), low outside, with edges
 * that follow a first-order lag of `riseS` (the pull-up and the wire's capacitance).
 */
export function twoLevels(
  highDeg: readonly (readonly [number, number])[],
  periodDeg: number,
  angleDeg: Float64Array,
  stepS: number,
  levels: { readonly low: number; readonly high: number; readonly riseS: number },
): Float64Array {
  const volts = new Float64Array(angleDeg.length);
  const follow = 1 - Math.exp(-stepS / levels.riseS);
  let state: number | null = null;
  for (let i = 0; i < angleDeg.length; i++) {
    const angle = ((angleDeg[i]! % periodDeg) + periodDeg) % periodDeg;
    const high = highDeg.some(([from, to]) =>
      from <= to ? angle >= from && angle < to : angle >= from || angle < to,
    );
    const target = high ? levels.high : levels.low;
    state = state === null ? target : state + (target - state) * follow;
    volts[i] = state;
  }
  return volts;
}

/** Stretches of a toothed wheel's teeth: `share` of each place is tooth. */
export function toothStretches(places: number, missing: number, share: number): [number, number][] {
  const pitch = 360 / places;
  return Array.from({ length: places - missing }, (_, tooth) => [tooth * pitch, (tooth + share) * pitch]);
}
