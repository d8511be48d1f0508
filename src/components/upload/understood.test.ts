import { describe, expect, it } from 'vitest';
import { readAs, rejectedWords, stepWords } from './understood.ts';

const reading = {
  encoding: 'utf-8',
  delimiter: ';',
  decimal: ',',
  timeUnit: 'ms',
  timeColumn: 0,
  headerLine: 4,
  rows: 2000,
  rejectedRows: [] as { line: number; found: string; expected: string }[],
  rejectedCount: 0,
  recordedAt: null,
  remarks: [],
};
const rejected = (...lines: number[]) => lines.map((line) => ({ line, found: 'over', expected: 'a number' }));

describe('readAs()', () => {
  it('says delimiter, decimal and time unit in words', () => {
    expect(readAs(reading)).toBe('semicolon, decimal comma, milliseconds');
    expect(readAs({ ...reading, delimiter: '\t', decimal: '.', timeUnit: null })).toBe(
      'tab, decimal point, no time column',
    );
  });
});

describe('stepWords()', () => {
  it('gives step and rate of an even axis', () => {
    expect(stepWords({ axis: 'even', sampleRateHz: 40_000 })).toBe('0.025 ms, 40 kHz');
  });
  it('gives no rate where there is none', () => {
    expect(stepWords({ axis: 'holds', sampleRateHz: null })).toContain('changes only');
    expect(stepWords({ axis: null, sampleRateHz: null })).toBe('not known yet');
  });
});

describe('rejectedWords()', () => {
  it('is silent when every row was read', () => expect(rejectedWords(reading)).toBeNull());
  it('names the lines and says what is kept', () => {
    expect(rejectedWords({ ...reading, rejectedCount: 2, rejectedRows: rejected(41, 42) })).toBe(
      '2 rows: lines 41 and 42. Readable cells are kept, the rest are holes.',
    );
    expect(rejectedWords({ ...reading, rejectedCount: 9, rejectedRows: rejected(1, 2, 3, 4) })).toContain(
      'lines 1, 2, 3 …',
    );
  });
});
