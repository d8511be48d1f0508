import type { RelationFindings, SignalFindings, Wheel } from '../capture.ts';
import type { CamEdges } from '../circuits/cam.ts';
import { camAngles } from './cam-angles.ts';
import { dwellAngle } from './dwell-angle.ts';
import { speedAgreement } from './speed-agreement.ts';

const COILS = new Set(['coil-primary-voltage', 'coil-primary-current', 'coil-command']);

/** What the signals of one capture show together, each against the capture's wheel. */
export function relate(
  wheel: Wheel | null,
  signals: readonly SignalFindings[],
  cams: ReadonlyMap<number, CamEdges>,
): RelationFindings[] {
  if (!wheel) return [];
  const out: RelationFindings[] = [];
  for (const [index, edges] of cams) out.push({ signals: [wheel.signal, index], ...camAngles(wheel, edges) });
  const crankSpeed = signals
    .find((s) => s.index === wheel.signal)
    ?.values.find((value) => value.key === 'rpm_mean');
  for (const signal of signals) {
    const pair = [wheel.signal, signal.index];
    if (COILS.has(signal.circuit)) {
      const dwell = signal.values.find((value) => value.key === 'dwell');
      if (dwell && dwell.value !== null)
        out.push({ signals: pair, values: [dwellAngle(wheel, dwell)], notices: [] });
    }
    if (signal.circuit === 'starter-current' && crankSpeed) {
      const speed = signal.values.find((value) => value.key === 'rpm_mean');
      const notice = speed ? speedAgreement(crankSpeed, speed) : null;
      if (notice) out.push({ signals: pair, values: [], notices: [notice] });
    }
  }
  return out;
}
