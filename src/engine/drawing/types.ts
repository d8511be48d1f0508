/** A stretch of the capture's own time axis, in seconds; `from` is before `to`. */
export interface View {
  readonly from: number;
  readonly to: number;
}

/** One signal as a drawing needs it. `factor` and `offset` apply on drawing: shown = recorded * factor + offset. */
export interface PlotSignal {
  readonly index: number;
  readonly name: string;
  /** One of the engine's circuits; one that this page does not know is drawn as "other". */
  readonly circuit: string;
  readonly unit: string;
  readonly factor: number;
  readonly offset: number;
  /** Drawn in ink with a solid line: what circuit it is must not show. */
  readonly plain?: boolean;
}

/** What turns seconds into crank degrees; the parts of the wheel that a drawing uses. */
export interface PlotWheel {
  /** Equal places round the wheel, missing ones included; null for added-tooth and uneven wheels. */
  readonly places: number | null;
  readonly teethPerTurn: number;
  readonly marksS: readonly number[];
  readonly teethS: readonly number[];
  readonly teethDeg: readonly number[];
}
