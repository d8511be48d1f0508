export interface ToothWheel {
  readonly places: number;
  readonly missing: number;
  /** Teeth (1 is the first after the gap) that pass with less flux: a chip, or dirt beside them. */
  readonly weak?: Readonly<Record<number, number>>;
  /** Part by which the air gap's effect varies once a turn. */
  readonly runOut?: number;
}

/**
 * Voltage of a two-wire pick-up, e = -N dΦ/dt (Faraday's law of induction): each tooth adds a bell of flux centred on it,
 * so the voltage is the bell's slope over angle times the speed. With normal polarity it rises as the tooth arrives and
 * falls through zero at its centre. `voltsAt200` is the swing's peak at 200 rev/min.
 */
export function pickUpVolts(
  wheel: ToothWheel,
  angleDeg: Float64Array,
  speedDegS: Float64Array,
  voltsAt200: number,
): Float64Array {
  const pitch = 360 / wheel.places;
  const width = pitch / 5;
  const slopePeak = Math.exp(-0.5) / width;
  const volts = new Float64Array(angleDeg.length);
  for (let i = 0; i < angleDeg.length; i++) {
    const inTurn = ((angleDeg[i]! % 360) + 360) % 360;
    const nearest = Math.round(inTurn / pitch);
    let slope = 0;
    for (let place = nearest - 2; place <= nearest + 2; place++) {
      const tooth = ((place % wheel.places) + wheel.places) % wheel.places;
      if (tooth >= wheel.places - wheel.missing) continue;
      const off = inTurn - place * pitch;
      slope += ((wheel.weak?.[tooth + 1] ?? 1) * -off * Math.exp(-0.5 * (off / width) ** 2)) / width ** 2;
    }
    const runOut = 1 + (wheel.runOut ?? 0) * Math.cos((inTurn * Math.PI) / 180);
    volts[i] = (voltsAt200 * runOut * (slope / slopePeak) * speedDegS[i]!) / 1200;
  }
  return volts;
}
