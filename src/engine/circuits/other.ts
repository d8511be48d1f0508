import type { Findings } from '../capture.ts';
import { crossings } from '../signal/crossings.ts';
import { stateLevels } from '../signal/levels.ts';
import { sortedRange } from '../signal/range.ts';
import { readingNoise } from '../signal/resolution.ts';
import { quantileSorted, spread } from '../signal/statistics.ts';
import { timeAt } from '../signal/time.ts';
import { absent, type Evidence, type Value } from '../value.ts';
import { bounded } from './events/bounded.ts';
import { clippedNotices } from './events/clipped.ts';
import { type Observation, oncePerEvent } from './events/once-per-event.ts';
import { stretch, whole } from './events/whole.ts';
import { momentsOf } from './other/moments.ts';
import type { MeasuredSignal } from './types.ts';

/** Periods that scatter more than this about their mean have no frequency to speak of. */
const STEADY_PERIOD = 0.25;
/** Otsu's ratio above which a trace has two levels (levels.ts). */
const TWO_LEVELS = 0.9;

/**
 * Plain numbers of any signal: lowest, highest, mean, rms; period and frequency where it repeats; duty and pulse width
 * where it has two levels. Passages are those of the middle between its states, with a dead band of 40 % of their distance.
 */
export function measureOther(signal: MeasuredSignal): Findings {
  const { values, axis, unit } = signal;
  const moments = momentsOf(values, axis);
  if (!moments) return nothing('no samples to measure', unit);
  const all = whole(axis);
  const at = (index: number): readonly Evidence[] => [stretch(axis, index, index)];
  const lowest = values[moments.lowestAt]!;
  const highest = values[moments.highestAt]!;
  const plain: Value[] = [
    { key: 'lowest', value: lowest, unit, evidence: at(moments.lowestAt) },
    { key: 'highest', value: highest, unit, evidence: at(moments.highestAt) },
    { key: 'mean', value: moments.mean, unit, evidence: all },
    { key: 'rms', value: moments.rms, unit, evidence: all },
  ];
  const rails = clippedNotices(signal, 'extremes are bounds, mean and rms are off');

  const holds = axis.kind === 'uneven' && axis.holds;
  const noise = holds ? 0 : readingNoise(values);
  const states = robustStates(values);
  if (!states || states.high - states.low < 10 * noise) {
    return { values: [...plain, ...noSwing('the trace does not swing beyond its noise')], notices: rails };
  }
  const found = crossings(values, {
    level: states.mesial,
    hysteresis: 0.4 * (states.high - states.low),
    holds,
  });
  const risesS: number[] = [];
  const highs: Observation[] = [];
  for (let k = 0; k < found.count; k += 1) {
    const here = timeAt(axis, found.at[k]!);
    if (found.rising[k] !== 1) continue;
    risesS.push(here);
    if (k + 1 < found.count && found.rising[k + 1] === 0) {
      const to = timeAt(axis, found.at[k + 1]!);
      highs.push({ value: (to - here) * 1000, evidence: { from: here, to } });
    }
  }
  const periodsS = risesS.slice(1).map((to, k) => to - risesS[k]!);
  const repeating = repeats(periodsS);
  const twoLevels = holds || states.bimodality > TWO_LEVELS;
  const notPeriodic =
    risesS.length < 3 ? 'fewer than two complete periods' : 'the swings do not repeat evenly';
  const reasonPulse = twoLevels ? 'no complete pulse in the capture' : 'the trace has no two levels';
  return {
    values: [
      ...plain,
      ...(repeating
        ? [
            oncePerEvent(
              'period',
              'ms',
              periodsS.map((p, k) => ({
                value: p * 1000,
                evidence: { from: risesS[k]!, to: risesS[k + 1]! },
              })),
              notPeriodic,
            ),
            {
              key: 'frequency',
              value: periodsS.length / (risesS[risesS.length - 1]! - risesS[0]!),
              unit: 'Hz',
              n: periodsS.length,
              evidence: [{ from: risesS[0]!, to: risesS[risesS.length - 1]! }],
            },
          ]
        : [absent('period', 'ms', notPeriodic), absent('frequency', 'Hz', notPeriodic)]),
      twoLevels && repeating
        ? duty(risesS, highs)
        : absent('duty', '%', twoLevels ? notPeriodic : reasonPulse),
      twoLevels
        ? oncePerEvent('pulse_width', 'ms', highs, reasonPulse)
        : absent('pulse_width', 'ms', reasonPulse),
    ],
    notices: rails,
  };
}

/** State levels between the 0.1 % and 99.9 % quantiles, so that a spike does not stretch the span. */
function robustStates(values: Float32Array) {
  const sorted = sortedRange(values, 0, values.length, 65_536);
  if (sorted.length < 2) return null;
  const low = quantileSorted(sorted, 0.001);
  const high = quantileSorted(sorted, 0.999);
  const margin = 0.02 * (high - low);
  return stateLevels(values, { low: low - margin, high: high + margin });
}

function repeats(periodsS: readonly number[]): boolean {
  const found = spread(periodsS);
  return found !== null && found.n >= 2 && found.sd < STEADY_PERIOD * found.mean;
}

/** Share of the high state over the whole periods. */
function duty(risesS: readonly number[], highs: readonly Observation[]): Value {
  const last = risesS[risesS.length - 1]!;
  const inside = highs.filter(({ evidence }) => evidence.from < last);
  const highS = inside.reduce((sum, { evidence }) => sum + evidence.to - evidence.from, 0);
  return {
    key: 'duty',
    value: (100 * highS) / (last - risesS[0]!),
    unit: '%',
    n: inside.length,
    evidence: bounded(inside.map((one) => one.evidence)),
  };
}

function noSwing(reason: string): Value[] {
  return [
    absent('period', 'ms', reason),
    absent('frequency', 'Hz', reason),
    absent('duty', '%', reason),
    absent('pulse_width', 'ms', reason),
  ];
}

function nothing(reason: string, unit: string): Findings {
  return {
    values: [
      ...['lowest', 'highest', 'mean', 'rms'].map((key) => absent(key, unit, reason)),
      ...noSwing(reason),
    ],
    notices: [],
  };
}
