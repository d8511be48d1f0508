export interface CoilFiring {
  readonly supplyV: number;
  /** Moments of switch-off, seconds. */
  readonly firingsS: readonly number[];
  readonly dwellS: number;
  readonly henry: number;
  readonly ohm: number;
  /** Peak of the kick where the plug's gap breaks down, seen at the primary. */
  readonly kickV: number;
  /** Null: the gap does not break down, the driver's clamp limits the kick and the energy rings out. */
  readonly burnS: number | null;
  readonly burnV: number;
  /** Amperes at once at switch-on: turns that are shorted have next to no inductance. */
  readonly stepA?: number;
  /** What the driver leaves standing while it is on. */
  readonly onDropV?: number;
}

const ON_DROP_V = 0.9;

/** Primary current: i = (U - u) / R * (1 - e^(-t R / L)) from switch-on, nothing after switch-off. */
export function coilAmperes(coil: CoilFiring, timeS: number): number {
  for (const off of coil.firingsS) {
    const on = off - coil.dwellS;
    if (timeS >= on && timeS < off) {
      const tau = coil.henry / coil.ohm;
      const dropV = coil.onDropV ?? ON_DROP_V;
      return (coil.stepA ?? 0) + ((coil.supplyV - dropV) / coil.ohm) * (1 - Math.exp(-(timeS - on) / tau));
    }
    if (timeS >= off && timeS < off + 8e-6) {
      return coilAmperes(coil, off - 1e-9) * (1 - (timeS - off) / 8e-6);
    }
  }
  return 0;
}

/** Voltage at the switched side: supply, near ground while the driver is on, kick, burn line, decaying ring, supply. */
export function coilVolts(coil: CoilFiring, timeS: number): number {
  for (const off of coil.firingsS) {
    const on = off - coil.dwellS;
    if (timeS < on || timeS >= off + 0.012) continue;
    if (timeS < off) return (coil.onDropV ?? ON_DROP_V) + 0.08 * coilAmperes(coil, timeS);
    return afterSwitchOff(coil, timeS - off);
  }
  return coil.supplyV;
}

function afterSwitchOff(coil: CoilFiring, afterS: number): number {
  const kickRiseS = 14e-6;
  const top = coil.burnS === null ? 70e-6 : 8e-6;
  const dropV = coil.onDropV ?? ON_DROP_V;
  if (afterS < kickRiseS)
    return dropV + (coil.kickV - dropV) * Math.sin((Math.PI / 2) * (afterS / kickRiseS));
  if (afterS < kickRiseS + top) return coil.kickV;
  const since = afterS - kickRiseS - top;
  if (coil.burnS === null) {
    const ring =
      (coil.kickV - coil.supplyV) * Math.exp(-since / 0.9e-3) * Math.cos(2 * Math.PI * 2600 * since);
    return Math.max(coil.supplyV + ring, -1);
  }
  if (since < coil.burnS) {
    const settle = (coil.kickV - coil.burnV) * Math.exp(-since / 12e-6);
    const ripple = 0.12 * coil.burnV * Math.exp(-since / 90e-6) * Math.cos(2 * Math.PI * 9000 * since);
    const rise = 0.14 * coil.burnV * (since / coil.burnS) ** 2;
    return coil.burnV + settle + ripple + rise;
  }
  const ringS = since - coil.burnS;
  return (
    coil.supplyV +
    (coil.burnV - coil.supplyV) * Math.exp(-ringS / 0.55e-3) * Math.cos(2 * Math.PI * 2600 * ringS)
  );
}
