import type { Findings, Wheel } from '../capture.ts';
import { extent } from '../signal/levels.ts';
import { mapped } from '../signal/mapped.ts';
import { spread } from '../signal/statistics.ts';
import { timeAt } from '../signal/time.ts';
import { absent, type Notice, type Value } from '../value.ts';
import { measureCrankHall } from './crank-hall.ts';
import type { MeasuredSignal } from './types.ts';
import { findPattern } from './wheel/find-pattern.ts';
import { gapRatio } from './wheel/gap-ratio.ts';
import { type Passages, placePassages } from './wheel/passages.ts';
import type { PatternResult } from './wheel/pattern.ts';
import { findPickup, type Pickup } from './wheel/pickup.ts';
import { pickupNotices } from './wheel/pickup-notices.ts';
import { layOnPlaces } from './wheel/places.ts';
import { type Polarity, tellPolarity, tellSteepness } from './wheel/polarity.ts';
import { isOrdinaryDivision } from './wheel/proof.ts';
import { PICKUP, type Sampling, samplingOf, TOO_FEW_SAMPLES } from './wheel/sample-rate.ts';
import { joinWheel, type ToothTrain } from './wheel/train.ts';
import { type CrankContext, wheelFindings, withoutWheel } from './wheel/wheel-findings.ts';

export interface CrankFindings extends Findings {
  readonly wheel: Wheel | null;
}

/**
 * A two-wire (variable reluctance) crank sensor: one swing a tooth, the tooth event at the zero crossing in its middle,
 * falling with normal polarity, about the local baseline (LM1815 data sheet, SNOSBU8F).
 */
export function measureCrankPickup(signal: MeasuredSignal, context: CrankContext): CrankFindings {
  // Changes only: there is no swing to look at, only edges.
  if (signal.axis.kind === 'uneven' && signal.axis.holds) return measureCrankHall(signal, context);
  const span = extent(signal.values);
  const pickup = span && span.highest > span.lowest ? findPickup(signal.values) : null;
  if (!span || !pickup) {
    const reason = 'no swing of a tooth stands out of the trace';
    return {
      values: [
        ...withoutWheel(reason),
        absent('polarity', '1', reason),
        absent('peak_to_peak', signal.unit, reason),
      ],
      notices: [flatNotice(signal)],
      wheel: null,
    };
  }
  const reading = readTeeth(signal, pickup, context);
  const { passages, train, result, polarity, sampling } = reading;
  const found = wheelFindings(train, result, context);
  const polarityValue: Value =
    polarity !== null && result.ok
      ? {
          key: 'polarity',
          value: polarity,
          unit: '1',
          evidence: found.wheel
            ? gapSpans(found.wheel)
            : [{ from: train.timesS[0]!, to: train.timesS.at(-1)! }],
        }
      : absent(
          'polarity',
          '1',
          result.ok ? 'the flanks of the gap do not tell it clearly' : 'no wheel was found',
        );
  return {
    values: [...found.values, polarityValue, peakToPeak(train.timesS, passages.swing, signal.unit)],
    notices: [...found.notices, ...pickupNotices(signal, span, passages, sampling, polarityValue)],
    wheel: found.wheel,
  };
}

interface Reading {
  readonly passages: Passages;
  readonly sampling: Sampling;
  readonly train: ToothTrain;
  readonly result: PatternResult;
  readonly polarity: Polarity | null;
}

/** Gaps this much longer (in tooth periods) by one kind of passage than by the other show which one is the teeth's. */
const LONGER_GAP = 0.4;

/** Of few teeth, a gap by the other passages that is no shorter than this many periods less speaks against. */
const NEARLY_AS_LONG = 0.15;
const FEW_TEETH = 12;
/** With fewer samples a tooth the heights of single passages are a matter of chance. */
const FEW_SAMPLES = 5;
/** Unless the teeth's own passages are this much more evenly spaced: between far teeth the signal is flat. */
const MORE_EVEN = 0.6;

/**
 * The tooth events by the polarity that the heights tell. Where they do not, both kinds of passage are tried: between
 * teeth the passage lies anywhere in the gap and cuts it in two, so the longer gap is the teeth's own.
 */
function readTeeth(signal: MeasuredSignal, pickup: Pickup, context: CrankContext): Reading {
  const read = (kind: 'falling' | 'rising', polarity: Polarity | null): Reading => {
    const passages = placePassages(pickup, kind);
    const sampling = samplingOf(passages.at, PICKUP);
    const train = {
      timesS: mapped(passages.at, (at) => timeAt(signal.axis, at)),
      swing: passages.swing,
      height: passages.height,
      halfWidth: passages.halfWidth,
      coarse: sampling.coarse,
    };
    const result = sampling.tooFew ? TOO_FEW_SAMPLES : findPattern(train.timesS, null, context.camEdgesS);
    return { passages, sampling, train, result, polarity };
  };
  const told = tellPolarity(pickup);
  if (told) {
    const [kind, opposite] =
      told === 'normal' ? (['falling', 'rising'] as const) : (['rising', 'falling'] as const);
    const reading = read(kind, told);
    if (tooCoarse(reading) && !tellSteepness(pickup)) return unclear(reading);
    // Few teeth, of which one may be weak: the passages between them must not make a wheel as well.
    if (!reading.result.ok || reading.result.pattern.teeth > FEW_TEETH || tellSteepness(pickup))
      return reading;
    const against = read(opposite, null);
    if (!against.result.ok) return reading;
    const [own, others] = [unevenness(reading), unevenness(against)];
    const asGood =
      others < MORE_EVEN * own ||
      (longestGap(against) > longestGap(reading) - NEARLY_AS_LONG && others < own / MORE_EVEN);
    return asGood ? unclear(reading) : reading;
  }
  const falling = read('falling', null);
  const rising = read('rising', null);
  if (tooCoarse(falling) || tooCoarse(rising)) return unclear(falling);
  const difference = longestGap(falling) - longestGap(rising);
  const chosen: Reading =
    difference > 0 ? { ...falling, polarity: 'normal' } : { ...rising, polarity: 'inverted' };
  if (Math.abs(difference) > LONGER_GAP && believable(chosen, falling.result.ok && rising.result.ok))
    return chosen;
  if (!falling.result.ok && !rising.result.ok) return falling;
  // An even wave without a gap, counted against a cam: both passages make the same wheel.
  const [one, other] = [falling.result, rising.result];
  if (one.ok && other.ok && one.pattern.name === other.pattern.name && one.pattern.gaps.length === 0)
    return falling;
  return unclear(falling);
}

const tooCoarse = ({ sampling }: Reading) => sampling.shortest !== null && sampling.shortest < FEW_SAMPLES;

const unclear = (reading: Reading): Reading => ({
  ...reading,
  polarity: null,
  result: {
    ok: false,
    evenly: false,
    reason: 'the teeth can be read from the falling and from the rising passages, and neither fits clearly',
  },
});

/** How far (root mean square, in periods) intervals are from whole numbers of places. */
function unevenness({ train }: Reading): number {
  const { ratio } = layOnPlaces(train.timesS);
  let squares = 0;
  for (const r of ratio) squares += Math.min(0.25, (r - Math.max(1, Math.round(r))) ** 2);
  return Math.sqrt(squares / Math.max(1, ratio.length));
}

/** Where only one reading makes a wheel, it must be an ordinary one, seen over three turns. */
function believable({ result }: Reading, both: boolean): boolean {
  if (both || !result.ok) return both;
  const { places, marks } = result.pattern;
  return places !== null && isOrdinaryDivision(places) && marks.length > 3;
}

/** The widest gap of the pattern as measured, in periods of the teeth beside it; 0 without one. */
function longestGap({ train, result }: Reading): number {
  if (!result.ok || result.pattern.gaps.length === 0) return 0;
  const ratio = gapRatio(joinWheel(train, result.pattern)).value;
  return typeof ratio === 'number' ? ratio : Array.isArray(ratio) ? Math.max(...(ratio as number[])) : 0;
}

/** From the last tooth of each turn to the reference mark. */
function gapSpans(wheel: Wheel): Array<{ from: number; to: number }> {
  const out: Array<{ from: number; to: number }> = [];
  let tooth = 0;
  for (const mark of wheel.marksS.slice(0, 50)) {
    while (tooth < wheel.teethS.length && wheel.teethS[tooth]! < mark) tooth += 1;
    const before = wheel.teethS[tooth - 1];
    if (before !== undefined) out.push({ from: before, to: mark });
  }
  return out;
}

function peakToPeak(timesS: Float64Array, swing: Float64Array, unit: string): Value {
  const all = spread(swing);
  if (!all) return absent('peak_to_peak', unit, 'no complete swing');
  return {
    key: 'peak_to_peak',
    value: all.mean,
    unit,
    n: all.n,
    min: all.min,
    max: all.max,
    sd: all.sd,
    evidence: [{ from: timesS[0]!, to: timesS.at(-1)! }],
  };
}

function flatNotice(signal: MeasuredSignal): Notice {
  const last = signal.values.length - 1;
  return {
    code: 'flat-line',
    severity: 'bad',
    text: 'No swing of a tooth stands out of this trace. Usual causes: the engine did not turn, the sensor, its plug or its wires are open or shorted, the gap to the wheel is too wide, or the probe is on the wrong pins. A flat line does not show where it comes from.',
    evidence: last > 0 ? [{ from: timeAt(signal.axis, 0), to: timeAt(signal.axis, last) }] : [],
  };
}
