import fc from 'fast-check';
import { expect, test } from 'vitest';
import { readTable } from './read.ts';
import { chunked, timesOf, utf16 } from './testing.ts';

/** A random number as an instrument writes it: fixed, scientific or shortest, with a decimal point. */
const cell = fc.oneof(
  fc
    .tuple(fc.double({ min: -1e4, max: 1e4, noNaN: true }), fc.integer({ min: 1, max: 8 }))
    .map(([value, digits]) => value.toFixed(digits)),
  fc
    .tuple(fc.double({ min: -1e30, max: 1e30, noNaN: true }), fc.integer({ min: 1, max: 12 }))
    .map(([value, digits]) => value.toExponential(digits)),
  fc.double({ min: -3e38, max: 3e38, noNaN: true }).map(String),
  fc.integer({ min: -99_999, max: 99_999 }).map((value) => `${value}.0`),
);

const dialect = fc.record({
  delimiter: fc.constantFrom(',', ';', '\t', '|'),
  comma: fc.boolean(),
  lineEnd: fc.constantFrom('\n', '\r\n', '\r'),
  isQuoted: fc.boolean(),
  trailing: fc.boolean(),
  hasNames: fc.boolean(),
  hasLastEnd: fc.boolean(),
  preamble: fc.constantFrom('', 'Bench recording', 'Date: 2026-05-06'),
  encoding: fc.constantFrom('utf-8', 'utf-8 mark', 'utf-16le', 'utf-16be', 'windows-1252'),
  unit: fc.constantFrom(['s', 0], ['ms', 3], ['µs', 6], ['ns', 9]) as fc.Arbitrary<[string, number]>,
});
type Written = typeof dialect extends fc.Arbitrary<infer T> ? T : never;

/** Whole steps of the time's last decimal, strictly rising. */
const timeSteps = fc.oneof(
  fc.integer({ min: 1, max: 1000 }).map((step) => () => step),
  fc
    .array(fc.integer({ min: 1, max: 1000 }), { minLength: 7, maxLength: 7 })
    .map((steps) => (i: number) => steps[i % 7]!),
);

function encoded(text: string, encoding: Written['encoding']): Uint8Array {
  if (encoding === 'utf-16le' || encoding === 'utf-16be')
    return utf16(`\ufeff${text}`, encoding === 'utf-16le');
  if (encoding === 'windows-1252') return Uint8Array.from(text, (letter) => letter.charCodeAt(0));
  return new TextEncoder().encode(encoding === 'utf-8' ? text : `\ufeff${text}`);
}

function written(rows: readonly (readonly string[])[], how: Written): Uint8Array {
  const comma = how.comma && how.delimiter !== ',';
  const line = (cells: readonly string[]) => {
    const shown = cells.map((text) => (how.isQuoted ? `"${text}"` : text));
    return shown.join(how.delimiter) + (how.trailing ? how.delimiter : '');
  };
  const names = ['Time', ...rows[0]!.slice(1).map((_, i) => `Signal ${i}`)];
  const head = [names.map((name, i) => (i === 0 ? `${name} (${how.unit[0]})` : `${name} (V)`))];
  const lines = [
    ...(how.preamble === '' ? [] : [how.preamble, '']),
    ...(how.hasNames ? head.map(line) : []),
    ...rows.map((row) => line(comma ? row.map((text) => text.replace('.', ',')) : row)),
  ];
  return encoded(lines.join(how.lineEnd) + (how.hasLastEnd ? how.lineEnd : ''), how.encoding);
}

test('readTable() gives every sample as Math.fround(Number(text)) and every time as Number(text), in any dialect', async () => {
  await fc.assert(
    fc.asyncProperty(
      dialect,
      fc
        .integer({ min: 1, max: 5 })
        .chain((width) =>
          fc.array(fc.array(cell, { minLength: width, maxLength: width }), { minLength: 6, maxLength: 60 }),
        ),
      timeSteps,
      fc.integer({ min: -5000, max: 5000 }),
      fc.integer({ min: 1, max: 7 }),
      fc.array(fc.nat(10_000), { maxLength: 6 }),
      async (how, cells, step, start, decimals, cuts) => {
        let ticks = start;
        const rows = cells.map((row, i) => {
          ticks += step(i);
          return [(ticks / 10 ** decimals).toFixed(decimals), ...row];
        });
        const table = await readTable(chunked(written(rows, how), cuts));
        if (!table.ok) throw new Error(`${table.code}: ${table.message}`);
        expect(table.reading.rejectedRows).toEqual([]);
        expect(table.columns.map(({ samples }) => [...samples])).toEqual(
          cells[0]!.map((_, column) => cells.map((row) => Math.fround(Number(row[column])))),
        );
        const shift = how.hasNames ? how.unit[1] : 0;
        const times = rows.map(([time]) => Number(`${time}e-${shift}`));
        const found = timesOf(table);
        if (table.axis.kind === 'uneven') expect(found).toEqual(times);
        else {
          const slack = 0.011 * table.axis.stepS;
          expect(found).toHaveLength(times.length);
          expect(found.every((time, i) => Math.abs(time - times[i]!) <= slack)).toBe(true);
        }
      },
    ),
    { numRuns: 600 },
  );
});

test('readTable() gives the same outcome wherever the chunks are cut', async () => {
  const line = fc.oneof(
    fc.tuple(fc.nat(100), fc.nat(9)).map(([a, b]) => `${a},${b}`),
    fc.constantFrom('', 'x', '1', '1,2,3', '"1","2', 'Time,U', ',', '5,OL', '-,-', '\u00b5,1'),
  );
  await fc.assert(
    fc.asyncProperty(
      fc.array(line, { maxLength: 40 }),
      fc.constantFrom('\n', '\r\n', '\r', '\r\r\n'),
      fc.array(fc.nat(500), { maxLength: 30 }),
      async (lines, lineEnd, cuts) => {
        const bytes = new TextEncoder().encode(
          `Time,U${lineEnd}0,1${lineEnd}1,2${lineEnd}${lines.join(lineEnd)}`,
        );
        expect(await readTable(chunked(bytes, cuts))).toEqual(await readTable(chunked(bytes)));
      },
    ),
    { numRuns: 500 },
  );
});

test('readTable() gives the same outcome from single bytes as from one chunk, over 64 KiB', async () => {
  const text = `Time (s);U (V)\r\n${Array.from({ length: 9000 }, (_, i) => `${(i * 2e-5).toFixed(5)};${Math.sin(i).toFixed(4)}`).join('\r\n')}`;
  const bytes = new TextEncoder().encode(text.replaceAll('.', ','));
  const each = Array.from({ length: bytes.length }, (_, i) => i);
  expect(await readTable(chunked(bytes, each))).toEqual(await readTable(chunked(bytes)));
});

test('readTable() neither throws nor hangs on broken bytes, and makes no more samples than the file has room for', async () => {
  const good = new TextEncoder().encode(
    `Time (s),U (V),I (A)\n${Array.from({ length: 60 }, (_, i) => `${i / 100},${i % 9},-1.5e-${i % 7}`).join('\n')}\n`,
  );
  const broken = fc
    .array(
      fc.tuple(
        fc.nat(good.length - 1),
        fc.oneof(fc.nat(255), fc.constantFrom(10, 13, 34, 44, 45, 46, 59, 9, 32, 101, 48)),
      ),
      { maxLength: 60 },
    )
    .map((changes) => {
      const bytes = good.slice();
      for (const [at, byte] of changes) bytes[at] = byte;
      return bytes;
    });
  const any = fc.uint8Array({ maxLength: 3000 });
  const ascii = fc
    .string({ unit: fc.constantFrom(...'0123456789.,;\t "-+eE\n\r:abOL∞µ'), maxLength: 1500 })
    .map((text) => new TextEncoder().encode(text));
  await fc.assert(
    fc.asyncProperty(
      fc.oneof(broken, any, ascii),
      fc.array(fc.nat(3000), { maxLength: 5 }),
      async (bytes, cuts) => {
        const outcome = await readTable(chunked(bytes, cuts), { hints: { sampleIntervalS: 0.001 } });
        if (!outcome.ok) {
          expect(outcome.message.length).toBeGreaterThan(10);
          expect(outcome.hint.length).toBeGreaterThan(10);
          return;
        }
        const { axis, columns, reading } = outcome;
        const count = axis.kind === 'even' ? axis.count : axis.timesS.length;
        expect(reading.rows).toBe(count);
        expect(count).toBeLessThanOrEqual(bytes.length);
        for (const { samples } of columns) {
          expect(samples.length).toBe(count);
          expect(samples.every((sample) => Number.isFinite(sample) || Number.isNaN(sample))).toBe(true);
        }
        if (axis.kind === 'even') expect(Number.isFinite(axis.startS) && axis.stepS > 0).toBe(true);
        else expect(axis.timesS.every((time, i) => i === 0 || time >= axis.timesS[i - 1]!)).toBe(true);
      },
    ),
    { numRuns: 3000 },
  );
});

test('readTable() bounds the holes that short rows make', async () => {
  const wide = Array.from({ length: 900 }, (_, i) => i).join(',');
  async function* source() {
    yield new TextEncoder().encode(`${wide}\n`.repeat(100));
    const short = new TextEncoder().encode(`${'900\n'.repeat(99)}${wide.replace(/^0/, '900')}\n`);
    for (let i = 0; i < 400; i++) yield short;
  }
  const outcome = await readTable(source(), { hints: { timeColumn: 0 } });
  if (!outcome.ok) throw new Error(outcome.message);
  expect(outcome.reading.rows * 899 * 4).toBeLessThan(40e6);
  expect(outcome.reading.remarks.join(' ')).toContain('another length');
});

test('readTable() passes over a line of more than a million characters', async () => {
  const long = 'x'.repeat(1_500_000);
  const rows = Array.from({ length: 20 }, (_, i) => `${i},${i}`);
  const text = `Time,U\n${rows.slice(0, 10).join('\n')}\n${long}\n${rows.slice(10).join('\n')}\n`;
  const outcome = await readTable(chunked(new TextEncoder().encode(text), [400_000, 800_000]));
  if (!outcome.ok) throw new Error(outcome.message);
  expect([...outcome.columns[0]!.samples]).toEqual(rows.map((_, i) => i));
  expect(outcome.reading.rejectedRows).toMatchObject([{ line: 12 }]);
});
