import type { Recording } from '../../samples/starter/record.ts';
import type { CaptureInput } from '../../src/engine/capture.ts';
import { proposeCircuit } from '../../src/engine/circuits/propose.ts';
import type { Side } from '../../src/engine/comparison/types.ts';
import { measureCapture } from '../../src/engine/measure.ts';

/** A recording measured as the product would measure it, without the file in between. */
export function sidesOf(recording: Recording, cylinders: number): Side[] {
  const axis = {
    kind: 'even' as const,
    startS: recording.startS,
    stepS: recording.stepS,
    count: recording.columns[0]!.values.length,
  };
  const input: CaptureInput = {
    axis,
    cylinders,
    signals: recording.columns.map(({ name, unit, values }, index) => {
      const samples = Float32Array.from(values);
      const { circuit } = proposeCircuit({ name, unit, factor: 1, samples, axis });
      return { index, name, unit, circuit, factor: 1, offset: 0, samples };
    }),
  };
  const found = measureCapture(input);
  return input.signals.map((signal, index) => ({
    name: signal.name,
    circuit: signal.circuit,
    unit: signal.unit,
    axis,
    values: signal.samples,
    wheel: found.wheel,
    measured: [
      ...found.signals[index]!.values,
      ...found.relations
        .filter((relation) => relation.signals.includes(index))
        .flatMap((relation) => relation.values),
    ],
  }));
}
