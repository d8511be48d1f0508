export interface InjectorPulses {
  readonly supplyV: number;
  readonly startsS: readonly number[];
  readonly widthS: number;
  /** The driver's clamp, above ground. */
  readonly clampV: number;
  /** Height of the needle's hump as it seats; 0: the needle does not move. */
  readonly humpV: number;
}

/** Voltage at the switched side of a saturated-switch injector: low while open, then the inductive spike and the needle's hump. */
export function injectorVolts(injector: InjectorPulses, timeS: number): number {
  for (const start of injector.startsS) {
    const end = start + injector.widthS;
    if (timeS < start || timeS >= end + 0.02) continue;
    if (timeS < end) return 0.25;
    const since = timeS - end;
    if (since < 0.25e-3) return injector.clampV;
    const decay = (injector.clampV - injector.supplyV) * Math.exp(-(since - 0.25e-3) / 0.45e-3);
    const hump = injector.humpV * Math.exp(-0.5 * ((since - 1.9e-3) / 0.18e-3) ** 2);
    return injector.supplyV + decay + hump;
  }
  return injector.supplyV;
}
