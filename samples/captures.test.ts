import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { CIRCUITS } from '../src/engine/circuit.ts';
import { proposeCircuit } from '../src/engine/circuits/propose.ts';
import { readTable } from '../src/engine/reading/read.ts';
import { SAMPLES } from './captures.ts';

const folder = join(import.meta.dirname, '..', 'public', 'samples');

async function* bytesOf(text: string): AsyncGenerator<Uint8Array> {
  yield new TextEncoder().encode(text);
}

describe('samples', () => {
  it.each(SAMPLES.map((sample) => [sample.file, sample] as const))(
    '%s in public/samples is what the program makes',
    (file, sample) => {
      expect(readFileSync(join(folder, file), 'utf8')).toBe(sample.csv());
    },
  );

  it('hold a good and a faulty one of every circuit, each proposed as what it is', async () => {
    const found = new Map<string, number>();
    for (const sample of SAMPLES) {
      const table = await readTable(bytesOf(sample.csv()));
      if (!table.ok) throw new Error(table.message);
      for (const { name, unit, factor, samples } of table.columns) {
        const { circuit } = proposeCircuit({ name, unit, factor, samples, axis: table.axis });
        found.set(circuit, (found.get(circuit) ?? 0) + 1);
      }
    }
    for (const circuit of CIRCUITS) expect(found.get(circuit) ?? 0, circuit).toBeGreaterThanOrEqual(2);
  });

  it('index.json lists every sample and says that it is simulated', () => {
    const index = JSON.parse(readFileSync(join(folder, 'index.json'), 'utf8')) as {
      file: string;
      text: string;
    }[];
    expect(index.map((entry) => entry.file)).toEqual(SAMPLES.map((sample) => sample.file));
    for (const entry of index) expect(entry.text).toMatch(/^Simulated\./);
  });
});
