/**
 * Starter current: an inrush that decays as the motor gains speed, then one hump a compression. The humps'
 * heights may differ by cylinder (a weak cylinder's is lower). `angleDeg` is the crank's angle, 0 before it turns.
 */
export function starterAmperes(
  timeS: number,
  angleDeg: number,
  starter: {
    readonly onS: number;
    readonly inrushA: number;
    readonly meanA: number;
    readonly humpA: readonly number[];
  },
): number {
  const since = timeS - starter.onS;
  if (since < 0) return 0;
  const inrush = (starter.inrushA - starter.meanA) * Math.exp(-since / 0.05) * (1 - Math.exp(-since / 0.004));
  const base = starter.meanA * (1 - Math.exp(-since / 0.004));
  const perCompression = 720 / starter.humpA.length;
  const phase = ((angleDeg % 720) + 720) % 720;
  const cylinder = Math.floor(phase / perCompression);
  const hump = (starter.humpA[cylinder] ?? 0) * 0.5 * (1 - Math.cos((2 * Math.PI * phase) / perCompression));
  return base + inrush + hump * (1 - Math.exp(-since / 0.15));
}
