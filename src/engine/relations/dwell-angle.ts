import type { Wheel } from '../capture.ts';
import { spread } from '../signal/statistics.ts';
import { absent, type Value } from '../value.ts';
import { crankAngleAt } from './crank-angle.ts';

/** `dwell_angle`: crank degrees that pass during each dwell (6 · rpm · s), from the coil's own dwell spans. */
export function dwellAngle(wheel: Wheel, dwell: Value): Value {
  const found: number[] = [];
  const evidence: Array<{ from: number; to: number }> = [];
  for (const { from, to } of dwell.evidence) {
    const begin = crankAngleAt(wheel, from);
    const end = crankAngleAt(wheel, to);
    if (begin === null || end === null || !(end > begin)) continue;
    found.push(end - begin);
    evidence.push({ from, to });
  }
  const all = spread(found);
  if (!all) return absent('dwell_angle', 'deg', 'no dwell while the crank speed is known');
  return {
    key: 'dwell_angle',
    value: all.mean,
    unit: 'deg',
    n: all.n,
    min: all.min,
    max: all.max,
    sd: all.sd,
    evidence: evidence.slice(0, 50),
  };
}
