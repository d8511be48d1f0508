import { describe, expect, it } from 'vitest';
import { columnNamesOf } from './column-names.ts';

const signal = (column: number, name: string) => ({
  index: 0,
  column,
  name,
  circuit: 'other' as const,
  circuitConfidence: 1,
  circuitBecause: '',
  unit: 'V',
  factor: 1,
  offset: 0,
  made: null,
});

describe('columnNamesOf()', () => {
  it('takes the signals’ names first, then the line of names', () => {
    const lines = [{ line: 1, cells: ['Time (ms)', 'KW (V)', 'spare'], role: 'names' as const }];
    expect(columnNamesOf(lines, [signal(1, 'KW')])).toEqual(['Time (ms)', 'KW', 'spare']);
  });
  it('leaves a name empty where the file gives none', () => {
    const lines = [{ line: 1, cells: ['0', '1', '2'], role: 'numbers' as const }];
    expect(columnNamesOf(lines, [])).toEqual(['', '', '']);
    expect(columnNamesOf([], [])).toEqual([]);
  });
});
