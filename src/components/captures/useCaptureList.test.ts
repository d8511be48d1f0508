import { describe, expect, it } from 'vitest';
import { filterQuery, filtersOf, hasFilters, NO_FILTERS } from './useCaptureList.ts';

describe('filterQuery()', () => {
  it('leaves out what is not set, and filtersOf() reads it back', () => {
    const filters = { search: 'crank & cam', circuit: '', status: 'ready' };
    expect(filterQuery(filters).toString()).toBe('search=crank+%26+cam&status=ready');
    expect(filtersOf(filterQuery(filters))).toEqual(filters);
  });
});

describe('hasFilters()', () => {
  it('tells an empty workshop from a search without a find', () => {
    expect(hasFilters(NO_FILTERS)).toBe(false);
    expect(hasFilters({ ...NO_FILTERS, circuit: 'crank-vr' })).toBe(true);
  });
});
