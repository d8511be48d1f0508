import { expect, test } from 'vitest';
import { read, readBad, readGood, timesOf, utf16 } from './testing.ts';

const NL = '\n';
const rows = (count: number, row: (i: number) => string) =>
  Array.from({ length: count }, (_, i) => row(i)).join(NL);

test('readTable() takes a decimal comma between semicolons for what it is', async () => {
  const { reading, columns, axis } = await readGood('Zeit (ms);U (V)\r\n0;1,5\r\n0,5;2,5\r\n1;-0,25\r\n');
  expect(reading).toMatchObject({ delimiter: ';', decimal: ',', timeUnit: 'ms', headerLine: 1, rows: 3 });
  expect([...columns[0]!.samples]).toEqual([1.5, 2.5, -0.25]);
  expect(axis).toEqual({ kind: 'even', startS: 0, stepS: 0.0005, count: 3 });
});

test('readTable() takes "1,5,2,5" for four columns under four names', async () => {
  const { columns } = await readGood('Time,a,b,c\n1,5,2,5\n2,6,3,6\n3,7,4,7\n');
  expect(columns.map(({ samples }) => samples[0])).toEqual([5, 2, 5]);
});

test('readTable() refuses commas that both separate and mark decimals rather than guess', async () => {
  const text = `Time,U\n${rows(20, (i) => `0,00${i % 10},1,5`)}\n`;
  expect(await readBad(text)).toMatchObject({ code: 'no_numbers', line: 2 });
});

test('readTable() reads one column of decimal commas when an interval is known', async () => {
  const { columns, reading } = await readGood('Abtastintervall: 0,5 ms\nU (V)\n0,125\n-0,25\n0,375\n');
  expect(reading).toMatchObject({ decimal: ',', timeColumn: null });
  expect([...columns[0]!.samples]).toEqual([0.125, -0.25, 0.375]);
});

test('readTable() reads thousands marks of every kind', async () => {
  const comma = await readGood('Time (s),p (kPa)\n0,"1,234.5"\n1,"12,345,678"\n2,999\n');
  expect([...comma.columns[0]!.samples]).toEqual([1234.5, 12345678, 999]);
  const point = await readGood('Time (s);p (kPa)\n0;1.234,5\n1;12.345.678\n2;999,5\n');
  expect([...point.columns[0]!.samples]).toEqual([1234.5, 12345678, 999.5]);
  const space = await readGood('Time (s);p (kPa)\n0;1\u00a0234,5\n1;12\u202f345\n2;9 999,5\n');
  expect([...space.columns[0]!.samples]).toEqual([1234.5, 12345, 9999.5]);
});

test('readTable() reads tabs, bars and runs of spaces', async () => {
  for (const mark of ['\t', '|', ' ', '   ', ' | ']) {
    const { columns, axis } = await readGood(`Time,U\n0,1.5\n0.1,2.5\n0.2,-3e-1\n`.replaceAll(',', mark));
    expect([...columns[0]!.samples], mark).toEqual([1.5, 2.5, Math.fround(-0.3)]);
    expect(axis, mark).toEqual({ kind: 'even', startS: 0, stepS: 0.1, count: 3 });
  }
});

test('readTable() follows a "sep=" line', async () => {
  const { reading } = await readGood('sep=;\nTime;U\n0;1\n1;2\n2;3\n');
  expect(reading).toMatchObject({ delimiter: ';', headerLine: 2 });
});

test('readTable() takes units from a row of their own and turns prefixes into factors', async () => {
  const { columns, reading, axis } = await readGood(
    'Time,Coil,Clamp,Rail\n(µs),(kV),(mA),(MPa)\n0,1,2,3\n10,4,5,6\n20,7,8,9\n',
  );
  expect(columns.map(({ name, unit, factor }) => [name, unit, factor])).toEqual([
    ['Coil', 'V', 1000],
    ['Clamp', 'A', 0.001],
    ['Rail', 'kPa', 1000],
  ]);
  expect(reading).toMatchObject({ timeUnit: 'us', headerLine: 1 });
  expect(axis).toEqual({ kind: 'even', startS: 0, stepS: 1e-5, count: 3 });
});

test('readTable() reads both micro signs, in UTF-8 and in Windows-1252', async () => {
  for (const sign of ['µ', 'μ', 'u']) {
    const { reading } = await readGood(`t [${sign}s];U [mV]\n0;1\n1;2\n2;3\n`);
    expect(reading.timeUnit, sign).toBe('us');
  }
  const latin = Uint8Array.from('t [\u00b5s];U [mV]\n0;1\n1;2\n2;3\n', (letter) => letter.charCodeAt(0));
  const { reading } = await readGood(latin);
  expect(reading).toMatchObject({ encoding: 'windows-1252', timeUnit: 'us' });
});

test('readTable() reads UTF-16 of either order, with and without a mark', async () => {
  for (const littleEndian of [true, false]) {
    for (const mark of ['\ufeff', '']) {
      const { reading, columns } = await readGood(
        utf16(`${mark}Zeit (µs)\tU (V)\r\n0\t1,5\r\n1\t2,5\r\n2\t3\r\n`, littleEndian),
      );
      expect(reading).toMatchObject({
        encoding: littleEndian ? 'utf-16le' : 'utf-16be',
        timeUnit: 'us',
        decimal: ',',
      });
      expect(columns[0]).toMatchObject({ name: 'U', unit: 'V' });
      expect([...columns[0]!.samples]).toEqual([1.5, 2.5, 3]);
    }
  }
});

test('readTable() finds interval, start and date in the lines above the table', async () => {
  const text =
    'Recorded: 2026-05-06 10:11:12\nSample interval: 20 µs\nStart time: -0.1 s\n\nCrank (V);Cam (V)\n1;2\n3;4\n5;6\n';
  const { axis, reading } = await readGood(text);
  expect(axis).toEqual({ kind: 'even', startS: -0.1, stepS: 2e-5, count: 3 });
  expect(reading).toMatchObject({
    timeColumn: null,
    timeUnit: null,
    recordedAt: '2026-05-06 10:11:12',
    headerLine: 5,
  });
});

test('readTable() finds the interval however the lines above say it', async () => {
  const said: readonly (readonly [string, number])[] = [
    ['Sample rate: 50 kS/s', 2e-5],
    ['Sampling rate;50000;Hz', 2e-5],
    ['Sample Interval (ms),0.02', 2e-5],
    ['# dt = 2e-05', 2e-5],
    ['Abtastrate: 50 kHz', 2e-5],
    ['Interval,0.00002,s', 2e-5],
    ['Sample period: 0,02 ms', 2e-5],
    ['"Time increment","2.0E-5"', 2e-5],
    ['Samplerate\t1 MS/s', 1e-6],
  ];
  for (const [line, interval] of said) {
    const { axis } = await readGood(`${line}\nCrank\n0.1\n0.2\n0.1\n`);
    expect(axis, line).toMatchObject({ kind: 'even', stepS: interval });
  }
});

test('readTable() asks for the interval when nothing tells it, and takes it from a hint', async () => {
  expect(await readBad('U\n1\n2\n1\n')).toMatchObject({ code: 'interval_needed' });
  expect(await readBad('Crank,Cam\n1.2,0\n2.1,0\n1.0,5\n')).toMatchObject({ code: 'interval_needed' });
  const { axis } = await readGood('U\n1\n2\n1\n', { sampleIntervalS: 0.001 });
  expect(axis).toEqual({ kind: 'even', startS: 0, stepS: 0.001, count: 3 });
});

test('readTable() says that a file of times alone holds no signal', async () => {
  expect(await readBad('Time (s)\n0\n0.1\n0.2\n')).toMatchObject({ code: 'one_column' });
});

test('readTable() infers the unit of nameless time from the interval above the table', async () => {
  const { reading, axis } = await readGood('Interval: 20 us\nTime,U\n0,1\n20,2\n40,3\n60,4\n');
  expect(reading.timeUnit).toBe('us');
  expect(axis).toMatchObject({ stepS: 2e-5 });
});

test('readTable() leaves a trailing delimiter without a column', async () => {
  const { columns, reading } = await readGood('Time (s),U (V),\n-0.1,1,\n0,2,\n0.1,3,\n');
  expect(columns).toHaveLength(1);
  expect(reading.rejectedCount).toBe(0);
});

test('readTable() makes holes of empty cells and says how many', async () => {
  const { columns, reading } = await readGood('Time,U,V\n0,1,\n1,,4\n2,3,5\n3,NaN,\n');
  expect([...columns[0]!.samples]).toEqual([1, Number.NaN, 3, Number.NaN]);
  expect([...columns[1]!.samples]).toEqual([Number.NaN, 4, 5, Number.NaN]);
  expect(reading.rejectedCount).toBe(0);
  expect(reading.remarks.join(' ')).toContain('2 holes');
});

test('readTable() keeps cells over range at the rail and tells the rail', async () => {
  for (const word of ['OL', 'over', '∞', '+inf', 'Overflow', 'over range']) {
    const { columns, reading } = await readGood(`Time,U\n0,1\n1,${word}\n2,19.5\n3,-7\n4,${word}\n`);
    expect([...columns[0]!.samples], word).toEqual([1, 19.5, 19.5, -7, 19.5]);
    expect(columns[0]!.rail, word).toEqual({ low: null, high: 19.5 });
    expect(reading.remarks.join(' '), word).toContain('over range in 2 rows');
    expect(reading.rejectedCount, word).toBe(0);
  }
  const low = await readGood('Time,U\n0,1\n1,-OL\n2,19.5\n3,-7\n');
  expect(low.columns[0]).toMatchObject({ rail: { low: -7, high: null } });
  expect(low.columns[0]!.samples[1]).toBe(-7);
});

test('readTable() reads clock times from the first row on, over midnight too', async () => {
  const { axis, reading } = await readGood(
    'Clock;U\n23:59:59,998;1\n23:59:59,999;2\n00:00:00,000;3\n00:00:00,001;4\n',
  );
  expect(axis).toEqual({ kind: 'even', startS: 0, stepS: 0.001, count: 4 });
  expect(reading).toMatchObject({ timeUnit: 'clock', recordedAt: '23:59:59,998' });
  const dated = await readGood(
    'When,U\n2026-05-06 10:00:00.5,1\n2026-05-06 10:00:01.0,2\n2026-05-06 10:00:01.5,3\n',
  );
  expect(dated.axis).toEqual({ kind: 'even', startS: 0, stepS: 0.5, count: 3 });
});

test('readTable() passes over a date column beside the time', async () => {
  const { columns } = await readGood(
    'Date,Time,U\n2026-05-06,10:00:00.5,1\n2026-05-06,10:00:01.0,2\n2026-05-06,10:00:01.5,3\n',
  );
  expect(columns.map(({ name }) => name)).toEqual(['U']);
});

test('readTable() leaves out a second time column that agrees, and the signals of one that does not', async () => {
  const same = await readGood('Time,A,Time,B\n0,1,0,5\n1,2,1,6\n2,3,2,7\n');
  expect(same.columns.map(({ name }) => name)).toEqual(['A', 'B']);
  const other = await readGood('Time (s),A,Time (s),B\n0,1,100,5\n1,2,101,6\n2,3,102,7\n');
  expect(other.columns.map(({ name }) => name)).toEqual(['A']);
  expect(other.reading.remarks.join(' ')).toContain('second time column, up to 100 s away');
});

test('readTable() reads the first of several tables and says where the next begins', async () => {
  const table = `Time,U\n${rows(5, (i) => `${i},${i}`)}\n`;
  for (const gap of ['\n', '\nSegment 2\n']) {
    const { reading } = await readGood(table + gap + table);
    expect(reading.rows).toBe(5);
    expect(reading.remarks.join(' ')).toContain('several tables');
  }
});

test('readTable() goes on over a repeated line of names while time goes on', async () => {
  const { reading } = await readGood('Time,U\n0,1\n1,2\n2,3\nTime,U\n3,4\n4,5\n');
  expect(reading.rows).toBe(5);
  expect(reading.rejectedCount).toBe(0);
});

test('readTable() reads two hundred columns', async () => {
  const names = ['Time', ...Array.from({ length: 200 }, (_, i) => `Ch${i}`)].join(',');
  const { columns } = await readGood(
    `${names}\n${rows(50, (i) => [i, ...Array.from({ length: 200 }, (_, k) => i + k / 8)].join(','))}\n`,
  );
  expect(columns).toHaveLength(200);
  expect(columns[199]!.samples[49]).toBe(49 + 199 / 8);
});

test('readTable() keeps uneven analog rows with their own times and lets nothing hold', async () => {
  const { axis } = await readGood('Time,U\n0,1.1\n0.1,1.2\n0.25,1.4\n0.3,1.5\n');
  expect(axis).toEqual({ kind: 'uneven', timesS: Float64Array.of(0, 0.1, 0.25, 0.3), holds: false });
});

test('readTable() reads changes only as levels that hold, even with equal steps', async () => {
  const uneven = await readGood('0,0\n8e-05,1\n0.00383033,0\n0.00654333,1\n0.009637,0\n');
  expect(uneven.axis).toMatchObject({ kind: 'uneven', holds: true });
  const equal = await readGood(`Time,D0\n${rows(40, (i) => `${i / 100},${i % 2}`)}\n`);
  expect(equal.axis).toMatchObject({ kind: 'uneven', holds: true });
});

test('readTable() finds the even step behind times rounded in print', async () => {
  const step = 1 / 48_000;
  const fixed = await readGood(`Time,U\n${rows(5000, (i) => `${(i * step).toFixed(5)},${i % 7}`)}\n`);
  expect(fixed.axis).toMatchObject({ kind: 'even', startS: 0, count: 5000 });
  expect(timesOf(fixed).at(-1)).toBeCloseTo(4999 * step, 4);
  const coarse = await readGood(`Time,U\n${rows(5000, (i) => `${(i * step).toFixed(4)},${i % 7}`)}\n`);
  expect(coarse.axis).toMatchObject({ kind: 'even', count: 5000 });
  expect(coarse.reading.remarks.join(' ')).toContain('printed to 0.0001 s');
  const digits = await readGood(
    `Time,U\n${rows(30_000, (i) => `${Number((0.5 + i * 1e-4).toPrecision(5))},${i % 7}`)}\n`,
  );
  expect(digits.axis).toMatchObject({ kind: 'even', count: 30_000, stepS: 1e-4 });
});

test('readTable() does not call an axis even from which one sample is missing', async () => {
  const { axis } = await readGood(`Time (ms),U\n${rows(1000, (i) => `${i < 500 ? i : i + 1},${i % 7}`)}\n`);
  expect(axis.kind).toBe('uneven');
});

test('readTable() takes the guard of an export off names and never off numbers', async () => {
  const { columns } = await readGood("Time,'=SUM(A1),'-5V rail (V)\n0,-1,2\n1,-3,4\n2,-5,6\n");
  expect(columns.map(({ name }) => name)).toEqual(['=SUM(A1)', '-5V rail']);
  expect([...columns[0]!.samples]).toEqual([-1, -3, -5]);
});

test('readTable() reports a row that cannot be read by its line and keeps the rest', async () => {
  const { reading, columns } = await readGood('Time,U,W\n0,1,2\n1,abc,3\n2,4\n3,5,6,7\n4,8,9\n');
  expect(reading.rejectedRows).toEqual([
    { line: 3, found: '“abc”', expected: 'a number in column 2, “U”' },
    { line: 4, found: '2 cells', expected: '3 cells' },
    { line: 5, found: 'more than 3 cells', expected: '3 cells' },
  ]);
  expect(reading.rows).toBe(5);
  expect([...columns[0]!.samples]).toEqual([1, Number.NaN, 4, 5, 8]);
  expect([...columns[1]!.samples]).toEqual([2, 3, Number.NaN, 6, 9]);
});

test('readTable() keeps the place of a line of rubbish as a hole when a sample is missing there', async () => {
  const lost = await readGood(`Time,U\n${rows(20, (i) => (i === 7 ? '#?!' : `${i / 10},${i}`))}\n`);
  expect(lost.axis).toMatchObject({ kind: 'even', count: 20, stepS: 0.1 });
  expect(lost.columns[0]!.samples[7]).toBeNaN();
  expect(lost.reading.rejectedRows).toEqual([{ line: 9, found: '“#?!”', expected: '2 numbers' }]);
  const inserted = await readGood(`Time,U\n${rows(20, (i) => `${i === 7 ? 'note\n' : ''}${i / 10},${i}`)}\n`);
  expect(inserted.axis).toMatchObject({ kind: 'even', count: 20, stepS: 0.1 });
  expect([...inserted.columns[0]!.samples]).toEqual(Array.from({ length: 20 }, (_, i) => i));
});

test('readTable() never merges rows, whatever quotes are left open', async () => {
  const { reading, columns } = await readGood('Time,U\n0,1\n1,"2\n2,3\n3,"4"\n4,5\n');
  expect(reading.rows).toBe(5);
  expect([...columns[0]!.samples]).toEqual([1, 2, 3, 4, 5]);
});

test('readTable() rejects one row whose time falls, and one that jumped ahead', async () => {
  const fell = await readGood(`Time,U\n${rows(20, (i) => `${i === 7 ? 0.1 : i / 10},${i}`)}\n`);
  expect(fell.reading.rejectedRows).toEqual([
    { line: 9, found: 'the time 0.1 s after 0.6 s', expected: 'times that rise' },
  ]);
  expect(fell.axis).toMatchObject({ kind: 'even', count: 20, stepS: 0.1 });
  const jumped = await readGood(`Time,U\n${rows(20, (i) => `${i === 7 ? 99 : i / 10},${i}`)}\n`);
  expect(jumped.reading.rejectedRows).toMatchObject([{ line: 9 }]);
  expect(jumped.axis).toMatchObject({ kind: 'even', count: 20, stepS: 0.1 });
});

test('readTable() says where time starts again', async () => {
  const text = `Time,U\n${rows(20, (i) => `${i % 10},${i}`)}\n`;
  expect(await readBad(text)).toMatchObject({ code: 'time_backwards', line: 12 });
  const falling = `Time,U\n${rows(20, (i) => `${20 - i},${i}`)}\n`;
  expect((await read(falling)).ok).toBe(false);
});

test('readTable() says what is wrong with a file that is no capture', async () => {
  expect(await readBad('')).toMatchObject({ code: 'empty_file' });
  expect(await readBad('\r\n\r\n  \n')).toMatchObject({ code: 'empty_file' });
  expect(await readBad('Time,U\n')).toMatchObject({ code: 'no_numbers' });
  expect(await readBad('Dear colleague,\nplease call me.\n')).toMatchObject({ code: 'no_numbers' });
  const png = Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13);
  expect(await readBad(png)).toMatchObject({
    code: 'not_text',
    message: 'The file is a PNG picture, not text.',
  });
  expect(await readBad(Uint8Array.of(0x50, 0x4b, 3, 4, 20, 0, 0, 0))).toMatchObject({ code: 'not_text' });
  expect(await readBad('Time,U\n0,1\n1,\0\0\n2,3\n')).toMatchObject({ code: 'not_text' });
  expect(await readBad('Time,U\n0,\n1,\n2,\n')).toMatchObject({ code: 'no_numbers' });
  const wide = Array.from({ length: 2000 }, (_, i) => i).join(',');
  expect(await readBad(`${wide}\n${wide}\n`)).toMatchObject({ code: 'too_many_columns' });
});

test('readTable() lets hints override what it would find', async () => {
  const text = 'A;B;C\n0;1,500;7\n1;2,500;8\n2;3,500;9\n';
  const { columns, reading, axis } = await readGood(text, {
    decimal: '.',
    timeUnit: 'ms',
    columns: [1],
    timeColumn: 0,
    headerLine: null,
  });
  expect(reading).toMatchObject({ decimal: '.', timeUnit: 'ms', headerLine: null, timeColumn: 0 });
  expect(columns.map(({ column, name }) => [column, name])).toEqual([[1, 'Column 2']]);
  expect([...columns[0]!.samples]).toEqual([1500, 2500, 3500]);
  expect(axis).toMatchObject({ kind: 'even', stepS: 0.001 });
  const second = await readGood('a,b\nx,y\n0,1\n1,2\n2,3\n', { headerLine: 1 });
  expect(second.reading.headerLine).toBe(1);
});

test('readTable() joins headings that a line end inside quotes has broken', async () => {
  const { columns, reading } = await readGood('"Time\n(ms)","Crank\n(V)"\n0,1\n1,2\n2,3\n');
  expect(reading).toMatchObject({ timeUnit: 'ms', headerLine: 1, rows: 3 });
  expect(columns[0]).toMatchObject({ name: 'Crank', unit: 'V' });
});

test('readTable() takes numbers for names where they follow a heading for the time', async () => {
  const { columns, reading } = await readGood('Time,1,2,3\n0,7,8,9\n1,7,8,9\n2,7,8,9\n');
  expect(reading.headerLine).toBe(1);
  expect(columns.map(({ name }) => name)).toEqual(['1', '2', '3']);
});

test('readTable() leaves out a column in which nothing was recorded, unless it was asked for', async () => {
  const text = 'Time,U,Note\n0,1,\n1,2,\n2,3,\n';
  expect((await readGood(text)).columns.map(({ name }) => name)).toEqual(['U']);
  expect((await readGood(text, { columns: [1, 2] })).columns).toHaveLength(2);
});

test('readTable() uses a counter of samples only with a known interval', async () => {
  expect(await readBad('Sample,U (V)\n0,1.5\n1,2.5\n2,3.5\n')).toMatchObject({ code: 'interval_needed' });
  const { axis, columns } = await readGood('Sample rate: 1 kHz\nSample,U (V)\n0,1.5\n1,2.5\n2,3.5\n');
  expect(axis).toMatchObject({ kind: 'even', stepS: 0.001 });
  expect(columns.map(({ name }) => name)).toEqual(['U']);
});

test('readTable() refuses a time that stands still or can hardly ever be read', async () => {
  expect(await readBad('Time,U\n5,1\n5,2\n5,3\n5,4\n')).toMatchObject({ code: 'interval_needed', line: 2 });
  expect(await readBad(`Time;U\n${rows(20, (i) => `${i === 0 ? 0 : `0.${i}`};${i},5`)}\n`)).toMatchObject({
    code: 'no_numbers',
  });
});

test('readTable() shows the first lines with what it made of them', async () => {
  const { preview } = await readGood('Bench\n\nTime,U\n(s),(V)\n0,1\n1,x\n2,3\n3,4\n');
  expect(preview.map(({ line, role }) => [line, role])).toEqual([
    [1, 'text'],
    [2, 'empty'],
    [3, 'names'],
    [4, 'units'],
    [5, 'numbers'],
    [6, 'rejected'],
    [7, 'numbers'],
    [8, 'numbers'],
  ]);
});

test('readTable() stops with the reason of an aborted signal', async () => {
  const { readTable } = await import('./read.ts');
  const { chunked } = await import('./testing.ts');
  const abort = new AbortController();
  abort.abort(new Error('cancelled'));
  const source = chunked(new TextEncoder().encode('Time,U\n0,1\n'));
  await expect(readTable(source, { signal: abort.signal })).rejects.toThrow('cancelled');
});
