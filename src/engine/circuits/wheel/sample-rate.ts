import type { TimeAxis } from '../../capture.ts';
import { quantile } from '../../signal/statistics.ts';
import { timeAt } from '../../signal/time.ts';
import type { Evidence, Notice } from '../../value.ts';
import type { PatternResult } from './pattern.ts';

/** Samples on the shortest things that make a tooth event: a period of a pick-up, a pulse of a three-wire sensor. */
export interface Sampling {
  /** 5 % quantile, in samples; null where there is nothing to count, or no even steps. */
  readonly shortest: number | null;
  /** Teeth may be missed between two samples: no wheel is named. */
  readonly tooFew: boolean;
  /** Single teeth cannot be judged. */
  readonly coarse: boolean;
}

export interface Needed {
  readonly fewest: number;
  readonly good: number;
  readonly wanted: number;
}

/** A sine needs two samples a period in theory, and some more for its crossings to be placed. */
export const PICKUP: Needed = { fewest: 3.5, good: 8, wanted: 20 };
/** A pulse shorter than two samples may fall between them. */
export const PULSE: Needed = { fewest: 2, good: 4, wanted: 10 };

export const TOO_FEW_SAMPLES: PatternResult = {
  ok: false,
  evenly: false,
  reason: 'too few samples fall on a tooth: teeth may lie between them',
};

export function samplingOf(places: Float64Array, needed: Needed): Sampling {
  const shortest = quantile(
    places.slice(1).map((at, k) => at - places[k]!),
    0.05,
  );
  return {
    shortest,
    tooFew: shortest !== null && shortest < needed.fewest,
    coarse: shortest !== null && shortest < needed.good,
  };
}

/** Says that the sample rate is low, and which one would do at this speed. */
export function lowRateNotice(
  axis: TimeAxis,
  places: Float64Array,
  { shortest, tooFew, coarse }: Sampling,
  needed: Needed,
  thing: string,
): Notice | null {
  if (shortest === null || !coarse || places.length < 2) return null;
  const first = places[0]!;
  const last = places.at(-1)!;
  const span: Evidence = { from: timeAt(axis, first), to: timeAt(axis, last) };
  const ratePerS = (last - first) / (span.to - span.from);
  const rate = roundUp(ratePerS * (needed.wanted / shortest));
  const what = tooFew
    ? 'Teeth fall between the samples, so no wheel is named.'
    : 'Heights and tooth-to-tooth speed are coarse, and teeth may be missed.';
  return {
    code: 'low-sample-rate',
    severity: tooFew ? 'bad' : 'watch',
    text: `Only about ${Math.max(1, shortest).toFixed(1)} samples fall on ${thing}. ${what} About ${rate.toLocaleString('en-US')} samples a second would do at this speed.`,
    evidence: [span],
  };
}

function roundUp(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value));
  const lead = [1, 2, 5, 10].find((step) => step * power >= value) ?? 10;
  return lead * power;
}
