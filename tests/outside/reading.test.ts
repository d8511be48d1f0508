import { createReadStream, existsSync, readFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import Papa from 'papaparse';
import { describe, expect, test } from 'vitest';
import { readTable } from '../../src/engine/reading/read.ts';
import { timesOf } from '../../src/engine/reading/testing.ts';

/**
 * Every cell of the example captures and recordings against Papa Parse (a general-purpose CSV package) and Number().
 * Sources of the recordings: ../shared/recordings/README.md.
 */
const CAPTURES = resolve(import.meta.dirname, '../../../shared/captures');
const RECORDINGS = resolve(import.meta.dirname, '../../../shared/recordings');

/** What each file is, as its README, its truth file or its first lines say. */
const EXPECTED: Record<
  string,
  { delimiter: string; decimal: string; perSecond: number; skip: number; rateHz: number | null }
> = {
  'coil-primary-amperes.csv': { delimiter: ',', decimal: '.', perSecond: 1, skip: 1, rateHz: 100_000 },
  'coil-primary-volts.csv': { delimiter: ',', decimal: '.', perSecond: 1, skip: 1, rateHz: 250_000 },
  'crank-36-1-pickup-reversed.csv': { delimiter: ';', decimal: ',', perSecond: 1e3, skip: 1, rateHz: 40_000 },
  'crank-36-2-three-wire.csv': { delimiter: ',', decimal: '.', perSecond: 1, skip: 5, rateHz: 50_000 },
  'crank-60-2-and-cam.csv': { delimiter: '\t', decimal: '.', perSecond: 1e6, skip: 1, rateHz: 50_000 },
  'crank-60-2-pickup.csv': { delimiter: ',', decimal: '.', perSecond: 1, skip: 1, rateHz: 50_000 },
  'injector-saturated.csv': { delimiter: ',', decimal: '.', perSecond: 1, skip: 1, rateHz: 100_000 },
  'starter-amperes-even.csv': { delimiter: ';', decimal: ',', perSecond: 1, skip: 1, rateHz: 10_000 },
  'edges-12-plus-1.csv': { delimiter: ',', decimal: '.', perSecond: 1, skip: 1, rateHz: null },
  'edges-36-2-1-cam.csv': { delimiter: ',', decimal: '.', perSecond: 1, skip: 1, rateHz: null },
  'edges-36-2-noisy.csv': { delimiter: ',', decimal: '.', perSecond: 1, skip: 0, rateHz: null },
  'edges-4-tooth-cam-3.csv': { delimiter: ',', decimal: '.', perSecond: 1, skip: 1, rateHz: null },
  'edges-60-2-eight-lines.csv': { delimiter: ',', decimal: '.', perSecond: 1, skip: 1, rateHz: null },
  'vr-60-2-volts-a.csv': { delimiter: ',', decimal: '.', perSecond: 1, skip: 1, rateHz: 10_000 },
};

for (const folder of [CAPTURES, RECORDINGS]) {
  const isThere = existsSync(folder);
  const what = folder === CAPTURES ? 'captures' : 'recordings';
  describe(`readTable() on the ${what}`, () => {
    const recorded = (name: string) => name.startsWith('edges-') || name.startsWith('vr-');
    const files = Object.keys(EXPECTED).filter((name) => recorded(name) === (folder === RECORDINGS));
    test.for(files)('agrees with Papa Parse and Number() on every cell of %s', async (name, context) => {
      if (!isThere) return context.skip(`${what} not present`);
      const path = join(folder, name);
      const { delimiter, decimal, perSecond, skip, rateHz } = EXPECTED[name]!;
      const text = readFileSync(path, 'utf8').replace(/^\ufeff/, '');
      const { data } = Papa.parse<string[]>(text, { delimiter, skipEmptyLines: true });
      const rows = data.slice(skip - (text.includes('\n\n') ? 1 : 0));
      const number = (cell: string) => Number(cell.replace(decimal, '.'));

      const table = await readTable(createReadStream(path));
      if (!table.ok) throw new Error(table.message);
      expect(table.reading).toMatchObject({ delimiter, decimal, rows: rows.length, rejectedCount: 0 });
      for (const { column, samples } of table.columns) {
        const wrong = samples.findIndex(
          (sample, i) => !Object.is(sample, Math.fround(number(rows[i]![column]!))),
        );
        expect(wrong).toBe(-1);
      }
      const times = timesOf(table);
      const printed = rows.map((row) => number(row[0]!) / perSecond);
      if (table.axis.kind === 'uneven') {
        expect(table.axis.holds).toBe(true);
        expect(times).toEqual(printed);
      } else {
        expect(1 / table.axis.stepS).toBeCloseTo(rateHz!, 6);
        const { stepS } = table.axis;
        expect(Math.max(...chunksOf(times.map((time, i) => Math.abs(time - printed[i]!))))).toBeLessThan(
          stepS / 1000,
        );
      }
      expect(rateHz === null).toBe(table.axis.kind === 'uneven');
    });
  });
}

/** The highest of each thousand: a call takes only so many arguments. */
function chunksOf(values: readonly number[]): number[] {
  const highest: number[] = [];
  for (let i = 0; i < values.length; i += 1000) highest.push(Math.max(...values.slice(i, i + 1000)));
  return highest;
}
