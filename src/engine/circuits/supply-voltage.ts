import type { Findings } from '../capture.ts';
import { evenMeans } from '../signal/even-means.ts';
import { highestIn, lowestIn, rangeMedian, sortedRange } from '../signal/range.ts';
import { quantileSorted } from '../signal/statistics.ts';
import { indexAtOrAfter } from '../signal/time.ts';
import { absent, type Value } from '../value.ts';
import { clippedNotices } from './events/clipped.ts';
import { partOf } from './events/part-of.ts';
import { stretch, whole } from './events/whole.ts';
import { momentsOf } from './other/moments.ts';
import { findCrankingDip } from './supply-voltage/cranking-dip.ts';
import { supplyNotices, upsideDownSupply } from './supply-voltage/notices.ts';
import type { MeasuredSignal } from './types.ts';

const STEP_S = 5e-3;
/** A supply that stays below this is measured the wrong way round. */
const UPSIDE_DOWN_V = -3;

/** Battery or feed voltage: at rest, at its lowest, and on the plateau while the starter turns the engine. */
export function measureSupplyVoltage(signal: MeasuredSignal): Findings {
  const { values, axis, unit } = signal;
  const low = lowestIn(values, 0, values.length);
  const means = evenMeans(values, axis, STEP_S);
  if (low < 0 || !means) {
    const reason = 'no samples to measure';
    return {
      values: [
        absent('rest_level', unit, reason),
        absent('lowest', unit, reason),
        absent('cranking_mean', unit, reason),
      ],
      notices: [],
    };
  }
  const lowest: Value = { key: 'lowest', value: values[low]!, unit, evidence: [stretch(axis, low, low)] };
  if (quantileSorted(sortedRange(values, 0, values.length), 0.98) < UPSIDE_DOWN_V) {
    const reason = 'the trace is upside down';
    return {
      values: [absent('rest_level', unit, reason), lowest, absent('cranking_mean', unit, reason)],
      notices: [upsideDownSupply(axis)],
    };
  }
  const dip = findCrankingDip(means);
  const indexOf = (step: number) => indexAtOrAfter(axis, means.startS + (step - 0.5) * means.stepS);
  const restTo = dip ? (dip.start === null ? 0 : indexOf(dip.start - 1)) : values.length;
  const rest = restTo > 2 ? rangeMedian(values, 0, restTo) : null;
  const plateau = dip ? ([indexOf(dip.plateau), indexOf(dip.to)] as const) : null;
  const cranking =
    plateau && plateau[1] - plateau[0] > 2
      ? momentsOf(values.subarray(...plateau), partOf(axis, plateau[0], plateau[1] - plateau[0]))
      : null;
  return {
    values: [
      rest === null
        ? absent('rest_level', unit, 'the capture begins while the starter already pulls on the supply')
        : { key: 'rest_level', value: rest, unit, evidence: [stretch(axis, 0, restTo - 1)] },
      lowest,
      cranking && plateau
        ? {
            key: 'cranking_mean',
            value: cranking.mean,
            unit,
            evidence: [stretch(axis, plateau[0], plateau[1] - 1)],
          }
        : absent('cranking_mean', unit, 'no cranking in the capture', whole(axis)),
    ],
    notices: [
      ...clippedNotices(signal, 'levels there are bounds'),
      ...supplyNotices(
        signal,
        rest,
        cranking?.mean ?? rangeMedian(values, 0, values.length) ?? 0,
        values[highestIn(values, 0, values.length)]!,
      ),
    ],
  };
}
