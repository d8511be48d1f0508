/** A trigger wheel read off a train of tooth events. */
export interface Pattern {
  readonly name: string;
  /** Equal places round the wheel, missing ones included; null where teeth stand unevenly. */
  readonly places: number | null;
  readonly teeth: number;
  readonly missing: number;
  /** Gaps in order from the reference mark on, the one before the mark last: places from tooth to tooth. */
  readonly gaps: readonly PatternGap[];
  /** Events that belong to the pattern, as indexes into the train; doubled ones are left out. */
  readonly events: Int32Array;
  /** For each of `events`: crank degrees, unwrapped, 0 at the first mark. Rises strictly within a stretch. */
  readonly degrees: Float64Array;
  /** Reference marks, as positions in `events`. */
  readonly marks: Int32Array;
  /** Turn number of each mark. Marks one apart are one complete turn. */
  readonly turns: Int32Array;
  /** Positions in `events` at which a new stretch begins, because the train could not be followed across. First: 0. */
  readonly stretches: readonly number[];
  /** Several gaps or teeth could serve as the reference; the first in time was taken. */
  readonly markIsFirstOfSeveral: boolean;
  /** Events that came back between two places in most turns (a doubled tooth), in places after the mark. */
  readonly doubled: readonly number[];
}

export interface PatternGap {
  /** Places from the last tooth before the gap to the first after it. */
  readonly size: number;
  /** Place of the last tooth before the gap, counted from the mark at 0. */
  readonly after: number;
}

export type PatternResult =
  | { readonly ok: true; readonly pattern: Pattern }
  | { readonly ok: false; readonly reason: string; readonly evenly: boolean };
