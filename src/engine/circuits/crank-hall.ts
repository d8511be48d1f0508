import type { Findings, Wheel } from '../capture.ts';
import { timeAt } from '../signal/time.ts';
import { absent, type Notice, type Value } from '../value.ts';
import type { MeasuredSignal } from './types.ts';
import { findPattern } from './wheel/find-pattern.ts';
import { chooseEdge, pulseWidths } from './wheel/leading-edge.ts';
import { levelNotices } from './wheel/level-notices.ts';
import { lowRateNotice, PULSE, samplingOf, TOO_FEW_SAMPLES } from './wheel/sample-rate.ts';
import { type TwoLevels, twoLevels } from './wheel/two-levels.ts';
import { type CrankContext, wheelFindings, withoutWheel } from './wheel/wheel-findings.ts';

/**
 * A three-wire (Hall or magneto-resistive) crank sensor: two levels. The tooth event is the edge that ends the gap's
 * long level, at the mesial level; without a gap the rising edge.
 */
export function measureCrankHall(
  signal: MeasuredSignal,
  context: CrankContext,
): Findings & { readonly wheel: Wheel | null } {
  const levels = twoLevels(signal);
  if (!levels.ok) {
    return {
      values: [...withoutWheel(levels.reason), ...levelValues(signal, null, levels.reason)],
      notices: [levels.notice],
      wheel: null,
    };
  }
  const edge = chooseEdge(levels);
  const timesS = edge.rising ? levels.risingS : levels.fallingS;
  const places = levels.places ?? new Float64Array(0);
  const sampling = samplingOf(places, PULSE);
  const result = sampling.tooFew
    ? TOO_FEW_SAMPLES
    : findPattern(timesS, pulseWidths(levels, edge.rising), context.camEdgesS);
  const train = { timesS, swing: null, height: null, halfWidth: null, coarse: sampling.coarse };
  const found = wheelFindings(train, result, context);
  const notices: Notice[] = [...found.notices, ...levelNotices(signal, levels)];
  const low = lowRateNotice(signal.axis, places, sampling, PULSE, 'the shortest pulse');
  if (low) notices.push(low);
  if (result.ok && result.pattern.gaps.length === 0) {
    notices.push({
      code: 'rising-edge-without-gap',
      severity: 'info',
      text: 'This wheel has no gap of missing teeth that would tell the leading edge, so the rising edge was taken as the tooth event. Angles may be shifted by the width of a tooth against a reading that takes the falling edge.',
      evidence: [{ from: timesS[0]!, to: timesS.at(-1)! }],
    });
  }
  return { values: [...found.values, ...levelValues(signal, levels, '')], notices, wheel: found.wheel };
}

function levelValues(signal: MeasuredSignal, levels: TwoLevels | null, reason: string): Value[] {
  const { unit, axis, values } = signal;
  if (!levels) {
    return [
      absent('level_low', unit, reason),
      absent('level_high', unit, reason),
      absent('duty', '%', reason),
    ];
  }
  const all = [{ from: timeAt(axis, 0), to: timeAt(axis, values.length - 1) }];
  return [
    { key: 'level_low', value: levels.low, unit, evidence: all },
    { key: 'level_high', value: levels.high, unit, evidence: all },
    levels.dutyPercent === null
      ? absent('duty', '%', 'no complete period')
      : {
          key: 'duty',
          value: levels.dutyPercent,
          unit: '%',
          n: levels.risingS.length - 1,
          evidence: [{ from: levels.risingS[0]!, to: levels.risingS.at(-1)! }],
        },
  ];
}
