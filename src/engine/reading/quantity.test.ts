import { describe, expect, it } from 'vitest';
import { placesBetween, quantityOf } from './quantity.ts';
import { readTable } from './read.ts';
import { parseUnit } from './units.ts';

async function* bytesOf(text: string): AsyncGenerator<Uint8Array> {
  yield new TextEncoder().encode(text);
}

async function read(lines: readonly string[]) {
  const table = await readTable(bytesOf(`${lines.join('\n')}\n`));
  if (!table.ok) throw new Error(table.message);
  return table;
}

describe('quantityOf()', () => {
  it.each([
    ['1.5 V', '.', '1.5', 'V', 1],
    ['12,3 mV', ',', '12,3', 'V', 1e-3],
    ['-4e-3s', '.', '-4e-3', 's', 1],
    ['20 µs', '.', '20', 's', 1e-6],
  ] as const)('reads "%s"', (text, decimal, number, unit, factor) => {
    expect(quantityOf(text, decimal)).toEqual({ number, unit: { unit, factor } });
  });
  it.each(['1.5', 'V', '1.5 V 2', 'CH1', '1.5 apples', '12:30 V', ''])('is null for "%s"', (text) => {
    expect(quantityOf(text, '.')).toBeNull();
  });
});

describe('placesBetween()', () => {
  it('gives decimal places within one quantity and null across two', () => {
    expect(placesBetween(parseUnit('mV')!, parseUnit('V')!)).toBe(3);
    expect(placesBetween(parseUnit('V')!, parseUnit('mV')!)).toBe(-3);
    expect(placesBetween(parseUnit('V')!, parseUnit('A')!)).toBeNull();
    expect(placesBetween(parseUnit('min')!, parseUnit('s')!)).toBeNull();
  });
});

describe('readTable() with units inside the cells', () => {
  it('takes the unit of a column from its cells, and each number as Number() gives it', async () => {
    const { columns, axis } = await read(['Time,Coil', '0.001 s,1.5 V', '0.002 s,1.6 V', '0.003 s,1.7 V']);
    expect(columns).toHaveLength(1);
    expect(columns[0]).toMatchObject({ name: 'Coil', unit: 'V', factor: 1 });
    expect([...columns[0]!.samples]).toEqual([1.5, 1.6, 1.7].map(Math.fround));
    expect(axis).toEqual({ kind: 'even', startS: 0.001, stepS: 0.001, count: 3 });
  });
  it('reads decimal commas and prefixes, and a prefix that changes on the way', async () => {
    const { columns, axis } = await read([
      'Zeit;Spule',
      '1,0 ms;900 mV',
      '1,1 ms;950,5 mV',
      '1,2 ms;1,2 V',
      '1300 µs;1,25 V',
    ]);
    expect(columns[0]).toMatchObject({ unit: 'V', factor: 1e-3 });
    expect([...columns[0]!.samples]).toEqual([900, 950.5, 1200, 1250].map(Math.fround));
    expect(axis).toMatchObject({ kind: 'even', startS: 0.001, count: 4 });
  });
  it('reports a cell in another unit and keeps the rows about it', async () => {
    const { columns, reading } = await read(['t,A', '0 s,1 A', '1 s,2 V', '2 s,3 A', '3 s,4 A', '4 s,5 A']);
    expect(reading.rejectedRows[0]).toMatchObject({ line: 3 });
    expect(columns[0]!.samples.length).toBeGreaterThanOrEqual(4);
  });
});

describe('readTable() with a preamble in two rows', () => {
  it('takes interval and start from under their keys', async () => {
    const { axis, columns } = await read([
      'Model,Sample Interval (ms),Start Time',
      'X1,0.1,-0.5',
      'CH1,CH2',
      'V,V',
      '1,2',
      '1.5,2.5',
      '2,3',
      '3,4',
    ]);
    expect(axis).toMatchObject({ kind: 'even', startS: -0.5, stepS: 1e-4, count: 4 });
    expect(columns.map(({ name }) => name)).toEqual(['CH1', 'CH2']);
  });
});
