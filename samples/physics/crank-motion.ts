export interface CrankMotion {
  readonly rpm: number;
  readonly cylinders: number;
  /** Depth of the speed's dip at each compression, 0 to 1. */
  readonly dip: number;
  /** Crank angle at time 0, degrees. */
  readonly startDeg: number;
}

/**
 * Crank angle in degrees and speed in degrees a second at equal steps of time. Every compression slows the engine, so
 * the speed is a mean less a cosine of `cylinders / 2` periods a turn; the angle is its integral by the midpoint rule.
 */
export function crankMotion(motion: CrankMotion, stepS: number, count: number) {
  const angleDeg = new Float64Array(count);
  const speedDegS = new Float64Array(count);
  const speedAt = (deg: number) =>
    6 * motion.rpm * (1 - motion.dip * Math.cos((deg * Math.PI * motion.cylinders) / 360));
  let deg = motion.startDeg;
  for (let i = 0; i < count; i++) {
    angleDeg[i] = deg;
    speedDegS[i] = speedAt(deg);
    deg += stepS * speedAt(deg + (stepS / 2) * speedAt(deg));
  }
  return { angleDeg, speedDegS };
}
