import { crossings } from '../../signal/crossings.ts';
import { extent, type StateLevels, stateLevels } from '../../signal/levels.ts';
import { mapped } from '../../signal/mapped.ts';
import { noiseDeviation, quantileSorted } from '../../signal/statistics.ts';
import { timeAt } from '../../signal/time.ts';
import type { Notice } from '../../value.ts';
import type { MeasuredSignal } from '../types.ts';

/** A two-level signal as edges in time order. */
export interface TwoLevels {
  readonly ok: true;
  readonly low: number;
  readonly high: number;
  readonly edgesS: Float64Array;
  readonly rising: Uint8Array;
  /** The edges' places among the samples; null where values hold until the next row. */
  readonly places: Float64Array | null;
  readonly risingS: Float64Array;
  readonly fallingS: Float64Array;
  /** Time high from the first to the last rising edge, per cent; null with fewer than two rising edges. */
  readonly dutyPercent: number | null;
}

export interface NotTwoLevels {
  readonly ok: false;
  readonly reason: string;
  readonly notice: Notice;
}

/** Dead band about the mesial level, as a share of the swing. */
const DEAD_BAND = 0.4;
/**
 * Noise (deviation) above this share of the swing is damped before edges are looked for. From a level to the far side of
 * the dead band it is 0.7 of the swing: seven deviations.
 */
const MOST_NOISE = 0.1;
/** Two levels as clear as this are not smoothed: with few samples a pulse its own edges look like noise. */
const CLEAR = 0.95;
/** Otsu's ratio under which the mode of a level is a matter of chance. */
const SHARP = 0.985;
/** Otsu's ratio under which the trace has no two levels. */
const LEAST_BIMODALITY = 0.8;
/** Pulses shorter than this share of their like are disturbances. */
const GLITCH = 0.1;

export function twoLevels(signal: MeasuredSignal): TwoLevels | NotTwoLevels {
  const { axis } = signal;
  const holds = axis.kind === 'uneven' && axis.holds;
  const range = holds ? undefined : withoutSpikes(signal.values);
  const raw = stateLevels(signal.values, range);
  if (!raw) return flat(signal);
  let values = signal.values;
  let levels = raw;
  if (!holds) {
    const noise = noiseDeviation(values) ?? 0;
    const share = noise / (raw.high - raw.low);
    if (range || (share > MOST_NOISE && raw.bimodality < CLEAR)) {
      // The median takes spikes of one or two samples and leaves half of the noise; a mean takes what is too much then.
      const left = 0.54 * share;
      values = runningMedian5(values);
      if (left > MOST_NOISE) {
        values = runningMean(values, Math.min(63, 2 * Math.ceil((left / MOST_NOISE) ** 2 / 2) + 1));
      }
      levels = stateLevels(values, range) ?? raw;
    }
    if (levels.bimodality < LEAST_BIMODALITY) return flat(signal, true);
    // Hum has its modes at its crests: where the levels are not sharp, the middle of each is meant.
    if (levels.bimodality < SHARP) levels = middleLevels(values, levels);
  }
  const swing = levels.high - levels.low;
  const found = crossings(values, { level: levels.mesial, hysteresis: DEAD_BAND * swing, holds });
  const timesS = mapped(found.at, (at) => timeAt(axis, at));
  const kept = withoutGlitches(timesS, found.rising);
  if (kept.length < 2) return flat(signal, true);
  const edgesS = mapped(kept, (k) => timesS[k]!);
  const rising = Uint8Array.from(kept, (k) => found.rising[k]!);
  const risingS = edgesS.filter((_, k) => rising[k] === 1);
  return {
    ok: true,
    low: levels.low,
    high: levels.high,
    edgesS,
    rising,
    places: holds ? null : mapped(kept, (k) => found.at[k]!),
    risingS,
    fallingS: edgesS.filter((_, k) => rising[k] === 0),
    dutyPercent: duty(edgesS, rising),
  };
}

/** Median of the samples on either side of the middle, which then lies between them; twice. */
function middleLevels(values: Float32Array, from: StateLevels): StateLevels {
  const step = Math.max(1, Math.floor(values.length / 30_000));
  const some = values.filter((value, i) => i % step === 0 && !Number.isNaN(value)).sort();
  let { low, high, mesial } = from;
  for (let round = 0; round < 2; round += 1) {
    const split = some.findIndex((value) => value >= mesial);
    if (split <= 0) break;
    low = quantileSorted(some.subarray(0, split), 0.5);
    high = quantileSorted(some.subarray(split), 0.5);
    mesial = (low + high) / 2;
  }
  return { ...from, low, high, mesial };
}

/** Samples beyond these shares of all are spikes when they widen the span by more than a third. */
const SPIKES = 0.003;
const WIDENED = 1.33;

/** The range of the samples without rare spikes, which would move the middle of the span; undefined where there are none. */
function withoutSpikes(values: Float32Array): { low: number; high: number } | undefined {
  const span = extent(values);
  if (!span) return undefined;
  const step = Math.max(1, Math.floor(values.length / 30_000));
  const some = values.filter((value, i) => i % step === 0 && !Number.isNaN(value)).sort();
  if (some.length === 0) return undefined;
  const low = quantileSorted(some, SPIKES);
  const high = quantileSorted(some, 1 - SPIKES);
  return span.highest - span.lowest > WIDENED * (high - low) && high > low ? { low, high } : undefined;
}

/** Median of five; holes stay, and what lies beside them is left as it is. */
function runningMedian5(values: Float32Array): Float32Array {
  const out = values.slice();
  for (let i = 2; i + 2 < values.length; i += 1) {
    const a = values[i - 2]!;
    const b = values[i - 1]!;
    const c = values[i]!;
    const d = values[i + 1]!;
    const e = values[i + 2]!;
    const low = Math.max(Math.min(a, b), Math.min(d, e));
    const high = Math.min(Math.max(a, b), Math.max(d, e));
    const middle = Math.max(Math.min(low, high), Math.min(c, Math.max(low, high)));
    if (!Number.isNaN(middle)) out[i] = middle;
  }
  return out;
}

function runningMean(values: Float32Array, width: number): Float32Array {
  const out = new Float32Array(values.length);
  const arm = width >> 1;
  let sum = 0;
  for (let i = -arm; i < values.length; i += 1) {
    const enter = values[Math.min(values.length - 1, i + arm)]!;
    const leave = values[Math.max(0, i - arm - 1)]!;
    sum += i === -arm ? 0 : enter - leave;
    if (i === 0) {
      sum = 0;
      for (let k = -arm; k <= arm; k += 1) sum += values[Math.min(values.length - 1, Math.max(0, k))]!;
    }
    if (i >= 0) out[i] = sum / width;
  }
  return out;
}

/** Takes out pairs of edges closer together than a tenth of the neighbouring pulses of the same level. */
function withoutGlitches(timesS: Float64Array, rising: Uint8Array): number[] {
  const kept: number[] = [];
  const width = (k: number) => (k >= 0 && k + 1 < timesS.length ? timesS[k + 1]! - timesS[k]! : Number.NaN);
  for (let k = 0; k < timesS.length; k += 1) {
    const around = [width(k - 4), width(k - 2), width(k + 2), width(k + 4)]
      .filter((w) => !Number.isNaN(w))
      .sort((a, b) => a - b);
    const usual = around[around.length >> 1];
    const next = [width(k - 3), width(k - 1), width(k + 1), width(k + 3)]
      .filter((w) => !Number.isNaN(w))
      .sort((a, b) => a - b);
    const other = next[next.length >> 1];
    if (
      usual !== undefined &&
      other !== undefined &&
      width(k) < GLITCH * usual &&
      width(k) < GLITCH * other &&
      rising[k] !== rising[k + 1]
    ) {
      k += 1;
      continue;
    }
    kept.push(k);
  }
  return kept;
}

function duty(edgesS: Float64Array, rising: Uint8Array): number | null {
  const first = rising.indexOf(1);
  const last = rising.lastIndexOf(1);
  if (first < 0 || last <= first) return null;
  let high = 0;
  for (let k = first; k < last; k += 1) if (rising[k] === 1) high += edgesS[k + 1]! - edgesS[k]!;
  return (100 * high) / (edgesS[last]! - edgesS[first]!);
}

function flat(signal: MeasuredSignal, moving = false): NotTwoLevels {
  const last = signal.values.length - 1;
  const evidence = last > 0 ? [{ from: timeAt(signal.axis, 0), to: timeAt(signal.axis, last) }] : [];
  return {
    ok: false,
    reason: moving ? 'the trace does not switch between two levels' : 'the trace stays at one level',
    notice: {
      code: moving ? 'no-two-levels' : 'flat-line',
      severity: 'bad',
      text: moving
        ? 'A three-wire sensor switches between two levels, and this trace does not. Usual causes: a floating or broken signal wire, a missing pull-up, or a two-wire sensor entered as a three-wire one. The trace alone does not show which.'
        : 'The trace stays at one level. Usual causes: the engine did not turn, or the sensor lacks supply, ground or its pull-up, or its wire is open or shorted. A flat line does not show where it comes from: check supply and ground at the plug first.',
      evidence,
    },
  };
}
