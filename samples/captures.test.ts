import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { SAMPLES } from './captures.ts';

const folder = join(import.meta.dirname, '..', 'public', 'samples');

describe('samples', () => {
  it.each(SAMPLES.map((sample) => [sample.file, sample] as const))(
    '%s in public/samples is what the program makes',
    (file, sample) => {
      expect(readFileSync(join(folder, file), 'utf8')).toBe(sample.csv());
    },
  );

  it('index.json lists every sample and says that it is simulated', () => {
    const index = JSON.parse(readFileSync(join(folder, 'index.json'), 'utf8')) as {
      file: string;
      text: string;
    }[];
    expect(index.map((entry) => entry.file)).toEqual(SAMPLES.map((sample) => sample.file));
    for (const entry of index) expect(entry.text).toMatch(/^Simulated\./);
  });
});
