import { mapped } from '../../signal/mapped.ts';
import type { Pattern } from './pattern.ts';

/** Tooth events of one crank signal, in seconds, with the swing at each where the sensor has two wires. */
export interface ToothTrain {
  readonly timesS: Float64Array;
  readonly swing: Float64Array | null;
  /** Answer of the tooth filter and its half-width, for comparing teeth. */
  readonly height: Float64Array | null;
  readonly halfWidth: Float64Array | null;
  /** So few samples fall on a tooth that heights and places of single teeth mean nothing. */
  readonly coarse: boolean;
}

/** A pattern joined with its times: what every turn-based value is computed from. */
export interface FoundWheel {
  readonly pattern: Pattern;
  /** Time of each of `pattern.events`, seconds. */
  readonly timesS: Float64Array;
  readonly swing: Float64Array | null;
  readonly height: Float64Array | null;
  readonly halfWidth: Float64Array | null;
  readonly coarse: boolean;
  /** Times of the reference marks. */
  readonly marksS: Float64Array;
}

export function joinWheel(train: ToothTrain, pattern: Pattern): FoundWheel {
  const timesS = mapped(pattern.events, (event) => train.timesS[event]!);
  const pick = (source: Float64Array | null) =>
    source ? mapped(pattern.events, (event) => source[event]!) : null;
  return {
    pattern,
    timesS,
    swing: pick(train.swing),
    height: pick(train.height),
    halfWidth: pick(train.halfWidth),
    coarse: train.coarse,
    marksS: mapped(pattern.marks, (position) => timesS[position]!),
  };
}

/** True when `position` opens a stretch: nothing is known between it and the event before. */
export function stretchStarts(pattern: Pattern): Set<number> {
  return new Set(pattern.stretches);
}

/** Tooth number in the turn (1 = reference mark) of every event; 0 where there is no mark to count from. */
export function toothNumbers(wheel: FoundWheel): Int32Array {
  const { degrees, places, teeth, gaps, marks } = wheel.pattern;
  const out = new Int32Array(degrees.length);
  if (marks.length === 0) return out;
  if (places === null) {
    let mark = 0;
    for (let k = 0; k < out.length; k += 1) {
      while (mark + 1 < marks.length && marks[mark + 1]! <= k) mark += 1;
      out[k] = ((((k - marks[mark]!) % teeth) + teeth) % teeth) + 1;
    }
    return out;
  }
  const numberAt = new Int32Array(places);
  const absent = new Uint8Array(places);
  for (const gap of gaps) for (let i = 1; i < gap.size; i += 1) absent[(gap.after + i) % places] = 1;
  let number = 0;
  for (let place = 0; place < places; place += 1) if (absent[place] === 0) numberAt[place] = ++number;
  for (let k = 0; k < out.length; k += 1) {
    const place = Math.round((degrees[k]! * places) / 360);
    out[k] = numberAt[((place % places) + places) % places]!;
  }
  return out;
}
