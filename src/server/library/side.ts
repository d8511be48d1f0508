import type { CaptureInput, SignalInput, Wheel } from '../../engine/capture.ts';
import type { Side } from '../../engine/comparison/types.ts';
import { measureCapture } from '../../engine/measure.ts';
import type { Value } from '../../engine/value.ts';

/** Values and wheel of one side, all by one engine version. */
export interface SideFindings {
  readonly signals: readonly { readonly index: number; readonly values: readonly Value[] }[];
  readonly relations: readonly { readonly signals: readonly number[]; readonly values: readonly Value[] }[];
  readonly wheel: Wheel | null;
}

/** Factor and offset applied; the samples themselves when there is nothing to apply. */
function applied(signal: SignalInput): Float32Array {
  if (signal.factor === 1 && signal.offset === 0) return signal.samples;
  return signal.samples.map((sample) => sample * signal.factor + signal.offset);
}

/** What the comparing engine takes, from one signal of an input and its findings. Null when the signal is not there. */
export function sideOf(input: CaptureInput, signalIndex: number, findings: SideFindings): Side | null {
  const signal = input.signals.find((candidate) => candidate.index === signalIndex);
  if (!signal) return null;
  const own = findings.signals.find((finding) => finding.index === signalIndex)?.values ?? [];
  const related = findings.relations
    .filter((relation) => relation.signals.includes(signalIndex))
    .flatMap((relation) => relation.values);
  return {
    name: signal.name,
    circuit: signal.circuit,
    unit: signal.unit,
    axis: input.axis,
    values: applied(signal),
    wheel: findings.wheel,
    measured: [...own, ...related],
  };
}

/** Measures again when what is kept was measured by another engine version. */
export function currentFindings(
  kept: { readonly engine: string; readonly findings: SideFindings },
  engineVersion: string,
  loadWhole: () => Promise<CaptureInput>,
): Promise<SideFindings> | SideFindings {
  if (kept.engine === engineVersion) return kept.findings;
  return loadWhole().then(measureCapture);
}
