/**
 * Current of a saturated-switch injector: i = U/R (1 − e^(−tR/L)). The needle's movement takes energy for a moment, which dents
 * the rise; without a dent the needle did not move. After the release the driver's clamp takes the current away in some 0.2 ms.
 */
export function injectorAmperes(
  timeS: number,
  injector: {
    readonly startsS: readonly number[];
    readonly widthS: number;
    readonly supplyV: number;
    readonly ohm: number;
    readonly henry: number;
    /** Depth of the dent in amperes; 0: the needle does not move. */
    readonly dentA: number;
  },
): number {
  const { ohm, henry, supplyV, widthS, dentA } = injector;
  const rising = (since: number) =>
    (supplyV / ohm) * -Math.expm1((-since * ohm) / henry) -
    dentA * Math.exp(-(((since - 1.5e-3) / 0.16e-3) ** 2));
  for (const start of injector.startsS) {
    const since = timeS - start;
    if (since >= 0 && since < widthS) return rising(since);
    const after = since - widthS;
    if (after >= 0 && after < 0.2e-3) return rising(widthS) * (1 - after / 0.2e-3);
  }
  return 0;
}
