import type { Wheel } from '../../capture.ts';
import { absent, type Notice, type Value } from '../../value.ts';
import { compressionBalance } from './compression-balance.ts';
import { gapRatio } from './gap-ratio.ts';
import { irregularTeeth } from './irregular-teeth.ts';
import type { PatternResult } from './pattern.ts';
import { instantSpeed, speedRipple, toothSpeeds } from './tooth-speed.ts';
import { type FoundWheel, joinWheel, type ToothTrain, toothNumbers } from './train.ts';
import { completeTurns, markSpans, turnValues } from './turn-values.ts';
import { patternNotices } from './wheel-notices.ts';

export interface CrankContext {
  /** Index of the signal in the capture. */
  readonly index: number;
  readonly cylinders: number | null;
  /** Rising edges of a cam signal of the same capture, seconds: counts the teeth of a wheel without a gap. */
  readonly camEdgesS: Float64Array | null;
}

export interface WheelFindings {
  readonly values: readonly Value[];
  readonly notices: readonly Notice[];
  readonly wheel: Wheel | null;
}

/** Every value that two- and three-wire crank signals share, from their tooth events and the pattern found in them. */
export function wheelFindings(
  train: ToothTrain,
  result: PatternResult,
  context: CrankContext,
): WheelFindings {
  if (!result.ok) return { values: withoutWheel(result.reason), notices: [], wheel: null };
  const wheel = joinWheel(train, result.pattern);
  const { pattern } = wheel;
  const hasMark = pattern.marks.length > 0;
  const spans = hasMark
    ? markSpans(completeTurns(wheel))
    : [{ from: wheel.timesS[0]!, to: wheel.timesS.at(-1)! }];
  const speeds = toothSpeeds(wheel);
  const gaps = gapRatio(wheel);
  const irregular = irregularTeeth(wheel, gaps);
  return {
    values: [
      {
        key: 'wheel_pattern',
        value: pattern.name,
        unit: '1',
        n: Math.max(0, pattern.marks.length - 1),
        evidence: spans,
      },
      { key: 'teeth_present', value: pattern.teeth, unit: '1', evidence: spans },
      { key: 'teeth_missing', value: pattern.missing, unit: '1', evidence: spans },
      gaps,
      ...turnValues(wheel),
      instantSpeed(speeds),
      speedRipple(speeds, hasMark),
      irregular.value,
      compressionBalance(speeds, pattern, context.cylinders),
    ],
    notices: patternNotices(wheel, irregular.value),
    wheel: hasMark ? exportWheel(wheel, irregular.offDeg, context.index) : null,
  };
}

const KEYS = [
  ['wheel_pattern', '1'],
  ['teeth_present', '1'],
  ['teeth_missing', '1'],
  ['gap_ratio', '1'],
  ['rev_count', '1'],
  ['rpm_mean', 'rpm'],
  ['rpm_instant', 'rpm'],
  ['speed_ripple', '%'],
  ['irregular_teeth', '1'],
  ['compression_balance', '%'],
] as const;

/** All wheel values, null with one reason; turn-based ones say that the mark is what they lack. */
export function withoutWheel(reason: string): Value[] {
  return KEYS.map(([key, unit]) =>
    absent(
      key,
      unit,
      key === 'rev_count' || key === 'rpm_mean' || key === 'speed_ripple'
        ? `no reference mark: ${reason}`
        : reason,
    ),
  );
}

function exportWheel(wheel: FoundWheel, offDeg: readonly number[], signal: number): Wheel {
  const { pattern, timesS, swing, marksS } = wheel;
  const numbers = toothNumbers(wheel);
  const heights = new Float64Array(pattern.teeth);
  const angles = new Float64Array(pattern.teeth);
  const counts = new Float64Array(pattern.teeth);
  const opening = pattern.degrees[pattern.marks[0]!]!;
  for (let k = 0; k < numbers.length; k += 1) {
    const tooth = numbers[k]! - 1;
    if (tooth < 0 || (swing !== null && Number.isNaN(swing[k]!))) continue;
    counts[tooth]! += 1;
    heights[tooth]! += swing ? swing[k]! : 0;
    angles[tooth]! += (((pattern.degrees[k]! - opening) % 360) + 360.000001) % 360;
  }
  return {
    signal,
    pattern: pattern.name,
    places: pattern.places,
    teethPerTurn: pattern.teeth,
    marksS: Array.from(marksS),
    teethS: Array.from(timesS),
    teethDeg: Array.from(pattern.degrees),
    toothHeights: swing ? Array.from(heights, (sum, i) => sum / Math.max(1, counts[i]!)) : null,
    toothAnglesDeg: Array.from(angles, (sum, i) => sum / Math.max(1, counts[i]!) + (offDeg[i] ?? 0)),
  };
}
