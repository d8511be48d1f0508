import { describe, expect, it } from 'vitest';
import { SAMPLES } from '../../samples/captures.ts';
import type { CaptureInput } from '../../src/engine/capture.ts';
import { proposeCircuit } from '../../src/engine/circuits/propose.ts';
import { compare } from '../../src/engine/comparison/compare.ts';
import type { Side } from '../../src/engine/comparison/types.ts';
import { measureCapture } from '../../src/engine/measure.ts';
import { readTable } from '../../src/engine/reading/read.ts';

/**
 * The outside here is arithmetic: the samples are made by a program that knows by how many crank degrees the cam is late
 * (samples/captures.ts), and 360 / 20 teeth of the crank sprocket = 18 degrees a belt tooth.
 */
async function sideOf(file: string, signal: number): Promise<Side> {
  const sample = SAMPLES.find((candidate) => candidate.file === file)!;
  async function* bytes() {
    yield new TextEncoder().encode(sample.csv());
  }
  const table = await readTable(bytes());
  if (!table.ok) throw new Error(table.message);
  const input: CaptureInput = {
    axis: table.axis,
    cylinders: sample.cylinders,
    signals: table.columns.map((column, index) => {
      const { circuit, unit } = proposeCircuit({ ...column, axis: table.axis });
      return {
        index,
        name: column.name,
        circuit,
        unit,
        factor: column.factor,
        offset: 0,
        samples: column.samples,
      };
    }),
  };
  const found = measureCapture(input);
  const own = input.signals[signal]!;
  const related = found.relations.filter((relation) => relation.signals.includes(signal));
  return {
    name: own.name,
    circuit: own.circuit,
    unit: own.unit,
    axis: input.axis,
    values: own.samples,
    wheel: found.wheel,
    measured: [...found.signals[signal]!.values, ...related.flatMap((relation) => relation.values)],
  };
}

describe('compare()', () => {
  it('finds a cam that is one belt tooth late: 18 degrees within 0.3 at all six edges, and says so', async () => {
    const late = await sideOf('crank-60-2-cam-late.csv', 1);
    const found = compare(late, [await sideOf('crank-60-2-with-cam.csv', 1)]);
    const edges = found.rows.filter((row) => row.key.startsWith('cam_'));
    expect(edges).toHaveLength(6);
    for (const row of edges) {
      expect(row.verdict).toBe('outside');
      expect(Math.abs(Number(row.here) - Number(row.reference) - 18)).toBeLessThan(0.3);
    }
    expect(found.text).toContain('18.0 degrees late');
    expect(found.alignment).toMatchObject({ by: 'reference mark' });
    expect(found.overlay?.axis).toBe('deg');
    expect(found.shape.parts.length).toBeGreaterThanOrEqual(6);
  });

  it('finds nothing outside and no parted stretch between a capture and itself', async () => {
    const side = await sideOf('crank-60-2-with-cam.csv', 1);
    const found = compare(side, [side]);
    expect(found.rows.filter((row) => row.verdict === 'outside')).toEqual([]);
    expect(found.shape.parts).toEqual([]);
    expect(found.text).toContain('lies as in the reference');
  });

  it('names the short tooth that the reference does not have', async () => {
    const found = compare(await sideOf('crank-60-2-weak-tooth.csv', 0), [
      await sideOf('crank-60-2-with-cam.csv', 0),
    ]);
    expect(found.rows.find((row) => row.key === 'irregular_teeth')).toMatchObject({
      here: '23',
      verdict: 'outside',
    });
    const [part] = found.shape.parts;
    // Tooth 23 of a 60-2 wheel is centred at 22 places of 6 degrees.
    expect(part!.from).toBeGreaterThan(126);
    expect(found.shape.parts.at(-1)!.to).toBeLessThan(138);
  });

  it('says that another wheel is probably another engine and trusts the alignment less', async () => {
    const found = compare(await sideOf('crank-36-1-reversed.csv', 0), [
      await sideOf('crank-60-2-with-cam.csv', 0),
    ]);
    expect(found.rows.find((row) => row.key === 'wheel_pattern')?.verdict).toBe('outside');
    expect(found.alignment.confidence).toBeLessThan(0.6);
  });

  it('lays coils on each other at switch-off and finds the missing burn line', async () => {
    const found = compare(await sideOf('coil-primary-no-burn.csv', 0), [
      await sideOf('coil-primary-burn.csv', 0),
    ]);
    expect(found.alignment.by).toBe('switch-off');
    expect(found.rows.find((row) => row.key === 'burn_time')).toMatchObject({
      here: null,
      verdict: 'outside',
    });
    expect(found.overlay?.axis).toBe('s');
    const kick = Math.max(...found.overlay!.reference.map((value) => value ?? 0));
    expect(kick).toBeGreaterThan(250);
  });
});
