import { describe, expect, it } from 'vitest';
import { shapeOf } from './shape.ts';
import type { Overlay } from './types.ts';

const overlay = (here: (number | null)[], reference: (number | null)[]): Overlay => ({
  axis: 'deg',
  start: 0,
  step: 1,
  here,
  reference,
  low: null,
  high: null,
  difference: [],
});

describe('shapeOf()', () => {
  it('finds no part and no difference for equal traces', () => {
    expect(shapeOf(overlay([0, 5, 0, 5], [0, 5, 0, 5]))).toEqual({ difference: 0, parts: [] });
  });

  it('names the stretch where one trace is higher', () => {
    const found = shapeOf(overlay([0, 5, 5, 5, 0], [0, 0, 0, 5, 0]));
    expect(found.parts).toEqual([{ from: 1, to: 3, axis: 'deg', text: 'higher here' }]);
  });

  it('leaves holes out and ends a stretch at one', () => {
    const found = shapeOf(overlay([5, 5, null, 5, 5, 0], [0, 0, 0, 0, 0, 5]));
    expect(found.parts.map(({ from, to }) => [from, to])).toEqual([
      [0, 2],
      [3, 6],
    ]);
  });

  it('is null for a reference without span and without an overlay', () => {
    expect(shapeOf(overlay([1, 2], [3, 3])).difference).toBeNull();
    expect(shapeOf(null)).toEqual({ difference: null, parts: [] });
  });
});
