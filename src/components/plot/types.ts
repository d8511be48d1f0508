/** A stretch of the capture's own time axis, in seconds; `from` is before `to`. */
export interface View {
  readonly from: number;
  readonly to: number;
}

/** One signal as the plot needs it. `factor` and `offset` apply on drawing: shown = recorded * factor + offset. */
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

/** What is drawn: the whole stretch recorded, its steps, its signals. Never the samples themselves. */
export interface PlotCapture {
  readonly startS: number;
  readonly durationS: number;
  readonly samples: number;
  readonly samplesVersion: number;
  readonly axis: 'even' | 'uneven' | 'holds' | null;
  readonly signals: readonly PlotSignal[];
}

/** What turns seconds into crank degrees; the parts of the API's wheel that the plot uses. */
export interface PlotWheel {
  /** Equal places round the wheel, missing ones included; null for added-tooth and uneven wheels. */
  readonly places: number | null;
  readonly teethPerTurn: number;
  readonly marksS: readonly number[];
  readonly teethS: readonly number[];
  readonly teethDeg: readonly number[];
}

export type MarkKind = 'point' | 'range' | 'level';

/** A mark as drawn. `value` is in the signal's unit with factor and offset applied. */
export interface PlotMark {
  readonly id: string;
  readonly kind: MarkKind;
  readonly signal: number | null;
  readonly from: number;
  readonly to: number | null;
  readonly value: number | null;
  readonly text: string;
  readonly author: string;
}

/** Samples behind the chosen number: hatched, with a dimension line that carries `label`. */
export interface PlotEvidence {
  readonly signal: number | null;
  readonly label: string;
  readonly stretches: readonly View[];
}
