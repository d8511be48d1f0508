import type { Findings, Wheel } from '../capture.ts';
import { extent } from '../signal/levels.ts';
import { spread } from '../signal/statistics.ts';
import { timeAt } from '../signal/time.ts';
import { absent, type Notice, type Value } from '../value.ts';
import { measureCrankHall } from './crank-hall.ts';
import type { MeasuredSignal } from './types.ts';
import { findPattern } from './wheel/find-pattern.ts';
import { placePassages } from './wheel/passages.ts';
import { findPickup } from './wheel/pickup.ts';
import { pickupNotices } from './wheel/pickup-notices.ts';
import { tellPolarity } from './wheel/polarity.ts';
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
  if (!pickup) {
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
  const polarity = tellPolarity(pickup);
  const kinds = polarity === 'inverted' ? (['rising'] as const) : (['falling', 'rising'] as const);
  const passages = placePassages(pickup, kinds[0]);
  const train = {
    timesS: Float64Array.from(passages.at, (at) => timeAt(signal.axis, at)),
    swing: passages.swing,
    height: passages.height,
    halfWidth: passages.halfWidth,
  };
  const result = findPattern(train.timesS, null, context.camEdgesS);
  const found = wheelFindings(train, result, context);
  const told = polarity !== null && result.ok;
  const polarityValue: Value = told
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
        result.ok ? 'no gap whose flanks could tell the polarity' : 'no wheel was found',
      );
  return {
    values: [...found.values, polarityValue, peakToPeak(train.timesS, passages.swing, signal.unit)],
    notices: [...found.notices, ...pickupNotices(signal, passages, polarityValue)],
    wheel: found.wheel,
  };
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
