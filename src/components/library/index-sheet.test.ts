import { describe, expect, it } from 'vitest';
import type { KnownGoodRowJson } from '../../contract/areas/library.ts';
import { engineKey, indexSheet, published, waiting } from './index-sheet.ts';

const known = (
  over: Partial<KnownGoodRowJson>,
  circuits: readonly KnownGoodRowJson['signals'][number]['circuit'][] = ['crank-vr'],
): KnownGoodRowJson => ({
  id: 'a'.repeat(20),
  state: 'published',
  engine: { make: 'Aldane', model: 'Sorrel 1.6', code: 'AS16', year: 2011, cylinders: 4, yearTo: null },
  condition: 'cranking',
  note: '',
  provenance: 'bench',
  instrument: '',
  probe: '',
  confirmed: '',
  wheelPattern: null,
  version: 1,
  supersedes: null,
  supersededBy: null,
  captureId: null,
  fromS: 0,
  toS: 1,
  engineVersion: '1',
  signals: circuits.map((circuit, index) => ({
    index,
    name: circuit,
    circuit,
    unit: 'V',
    portrait: null,
    values: [],
  })),
  createdBy: { id: 'p'.repeat(20), name: 'Runa' },
  createdAt: '2026-01-01T00:00:00.000Z',
  publishedAt: null,
  ...over,
});

describe('indexSheet()', () => {
  it('puts one engine written in two ways into one row, and says its years', () => {
    const later = known({
      engine: { make: 'ALDANE ', model: 'sorrel 1.6', code: 'as16', year: 2013, cylinders: 4, yearTo: null },
    });
    const sheet = indexSheet([known({}), later]);
    expect(sheet).toHaveLength(1);
    expect(sheet[0]).toMatchObject({ name: 'Aldane Sorrel 1.6', detail: 'AS16, 2011 to 2013' });
    expect(engineKey(later.engine)).toBe(sheet[0]!.key);
  });
  it('sets a known-good of two signals into both columns, two circuits of one role once', () => {
    const [row] = indexSheet([known({}, ['crank-vr', 'cam-hall', 'cam-vr'])]);
    expect([...row!.cells.keys()]).toEqual(['crank', 'cam']);
    expect(row!.cells.get('cam')).toHaveLength(1);
  });
  it('orders engines by name', () => {
    const other = known({
      engine: { make: 'Aba', model: 'X', code: '', year: null, yearTo: null, cylinders: null },
    });
    expect(indexSheet([known({}), other]).map((row) => [row.name, row.detail])).toEqual([
      ['Aba X', ''],
      ['Aldane Sorrel 1.6', 'AS16, 2011'],
    ]);
  });
});

describe('published() and waiting()', () => {
  it('count only their own state', () => {
    const items = [
      known({}),
      known({ state: 'proposed' }),
      known({ state: 'returned' }),
      known({ state: 'retired' }),
    ];
    expect([published(items), waiting(items)]).toEqual([1, 1]);
  });
});
