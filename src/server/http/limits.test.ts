import { describe, expect, it } from 'vitest';
import { delayS } from './limits.ts';

describe('delayS()', () => {
  it('is nothing for the free tries, then doubles up to the longest', () => {
    expect([1, 5, 6, 7, 8, 9].map((tries) => delayS(tries, 5, 300))).toEqual([0, 0, 2, 4, 8, 16]);
    expect(delayS(13, 5, 300)).toBe(256);
    expect(delayS(14, 5, 300)).toBe(300);
    expect(delayS(1_000_000, 5, 300)).toBe(300);
  });
});
