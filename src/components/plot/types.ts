import type { PlotSignal, View } from '../../engine/drawing/types.ts';

export type { PlotSignal, PlotWheel, View } from '../../engine/drawing/types.ts';

/** What is drawn: the whole stretch recorded, its steps, its signals. Never the samples themselves. */
export interface PlotCapture {
  readonly startS: number;
  readonly durationS: number;
  readonly samples: number;
  readonly samplesVersion: number;
  readonly axis: 'even' | 'uneven' | 'holds' | null;
  readonly signals: readonly PlotSignal[];
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
