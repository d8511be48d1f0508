import { timeAt } from '../../signal/time.ts';
import type { Notice } from '../../value.ts';
import type { MeasuredSignal } from '../types.ts';
import type { TwoLevels } from './two-levels.ts';

/** What the two levels of a three-wire sensor say about its supply, ground and pull-up, and about the recording. */
export function levelNotices(signal: MeasuredSignal, levels: TwoLevels): Notice[] {
  const evidence = [{ from: timeAt(signal.axis, 0), to: timeAt(signal.axis, signal.values.length - 1) }];
  if (signal.axis.kind === 'uneven' && signal.axis.holds) return [];
  if (signal.unit !== 'V') return [];
  const { low, high } = levels;
  const swing = high - low;
  const duty = (levels.dutyPercent ?? 50) / 100;
  const average = low + swing * duty;
  if (low < -0.15 * swing && high > 0.15 * swing && Math.abs(average) < 0.12 * swing) {
    return [
      {
        code: 'ac-coupled',
        severity: 'watch',
        text: 'The trace lies about 0 V, as with an input set to AC coupling. Edges and times are right, but the levels mean nothing then: set the input to DC and record again to judge supply and ground.',
        evidence,
      },
    ];
  }
  const out: Notice[] = [];
  if (low > 0.8) {
    out.push({
      code: 'low-level-raised',
      severity: 'watch',
      text: `The low level stays at ${low.toFixed(2)} V. This usually points at the sensor's ground or at a driver that no longer pulls down fully; check the voltage drop of the ground wire. Some sensors rest above 0 V by design: a known-good decides.`,
      evidence,
    });
  }
  if (high < 4.4 || (high > 5.6 && high < 8.5)) {
    out.push({
      code: 'high-level-low',
      severity: 'watch',
      text: `The high level is ${high.toFixed(2)} V, neither about 5 V nor battery voltage. This usually points at supply or pull-up, or at a probe factor that is not entered. The maker's figure decides.`,
      evidence,
    });
  }
  return out;
}
