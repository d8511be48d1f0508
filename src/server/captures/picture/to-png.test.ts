import { describe, expect, it } from 'vitest';
import { finenessOf } from './to-png.ts';

describe('finenessOf()', () => {
  it('is two for a picture of ordinary size and never makes more than 24 million pixels', () => {
    expect(finenessOf(1200, 600)).toBe(2);
    const fineness = finenessOf(3200, 3300);
    expect(fineness).toBeLessThan(2);
    expect(3200 * fineness * 3300 * fineness).toBeLessThanOrEqual(24_000_001);
  });
});
