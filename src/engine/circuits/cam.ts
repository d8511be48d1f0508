import type { Findings } from '../capture.ts';
import { mapped } from '../signal/mapped.ts';
import { spread } from '../signal/statistics.ts';
import { timeAt } from '../signal/time.ts';
import { absent, type Notice } from '../value.ts';
import type { MeasuredSignal } from './types.ts';
import { levelNotices } from './wheel/level-notices.ts';
import { placePassages } from './wheel/passages.ts';
import { findPickup } from './wheel/pickup.ts';
import { tellPolarity } from './wheel/polarity.ts';
import { twoLevels } from './wheel/two-levels.ts';

/** Edges of a cam signal, seconds. A pick-up has one event a lobe, on the side of its tooth centre; the other is null. */
export interface CamEdges {
  readonly risingS: Float64Array | null;
  readonly fallingS: Float64Array | null;
}

export interface CamFindings extends Findings {
  readonly edges: CamEdges | null;
}

/** A cam signal by itself: levels and edges. Its angles need a crank signal beside it (`relations/cam-angles.ts`). */
export function measureCam(signal: MeasuredSignal): CamFindings {
  const holds = signal.axis.kind === 'uneven' && signal.axis.holds;
  return signal.circuit === 'cam-vr' && !holds ? pickup(signal) : levels(signal);
}

function levels(signal: MeasuredSignal): CamFindings {
  const { unit, axis, values } = signal;
  const found = twoLevels(signal);
  if (!found.ok) {
    const missing = [absent('level_low', unit, found.reason), absent('level_high', unit, found.reason)];
    return { values: [...missing, absent('duty', '%', found.reason)], notices: [found.notice], edges: null };
  }
  const all = [{ from: timeAt(axis, 0), to: timeAt(axis, values.length - 1) }];
  const duty =
    found.dutyPercent === null
      ? absent('duty', '%', 'no complete period')
      : {
          key: 'duty',
          value: found.dutyPercent,
          unit: '%',
          n: found.risingS.length - 1,
          evidence: [{ from: found.risingS[0]!, to: found.risingS.at(-1)! }],
        };
  return {
    values: [
      { key: 'level_low', value: found.low, unit, evidence: all },
      { key: 'level_high', value: found.high, unit, evidence: all },
      duty,
    ],
    notices: levelNotices(signal, found),
    edges: { risingS: found.risingS, fallingS: found.fallingS },
  };
}

function pickup(signal: MeasuredSignal): CamFindings {
  const found = findPickup(signal.values);
  if (!found) {
    const reason = 'no swing of a lobe stands out of the trace';
    const last = signal.values.length - 1;
    const notice: Notice = {
      code: 'flat-line',
      severity: 'bad',
      text: 'No swing of a lobe stands out of this trace. Usual causes: the engine did not turn, or the sensor, its plug or its wires are open or shorted. A flat line does not show where it comes from.',
      evidence: last > 0 ? [{ from: timeAt(signal.axis, 0), to: timeAt(signal.axis, last) }] : [],
    };
    return { values: [absent('peak_to_peak', signal.unit, reason)], notices: [notice], edges: null };
  }
  const inverted = tellPolarity(found) === 'inverted';
  const passages = placePassages(found, inverted ? 'rising' : 'falling');
  const timesS = mapped(passages.at, (at) => timeAt(signal.axis, at));
  const swing = spread(passages.swing);
  return {
    values: [
      swing
        ? {
            key: 'peak_to_peak',
            value: swing.mean,
            unit: signal.unit,
            n: swing.n,
            min: swing.min,
            max: swing.max,
            sd: swing.sd,
            evidence: [{ from: timesS[0]!, to: timesS.at(-1)! }],
          }
        : absent('peak_to_peak', signal.unit, 'no complete swing'),
    ],
    notices: [],
    edges: inverted ? { risingS: timesS, fallingS: null } : { risingS: null, fallingS: timesS },
  };
}
