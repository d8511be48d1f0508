import { describe, expect, it } from 'vitest';
import { parseFactor } from './parse-factor.ts';

describe('parseFactor()', () => {
  it('takes a ratio as it stands on the probe', () => {
    expect(parseFactor('20:1')).toBe(20);
    expect(parseFactor(' 1 : 10 ')).toBe(0.1);
  });
  it('takes a plain number with point or comma, and a negative one', () => {
    expect(parseFactor('0,01')).toBe(0.01);
    expect(parseFactor('-1')).toBe(-1);
    expect(parseFactor('1e-3')).toBe(0.001);
  });
  it('refuses what is no number, half a ratio, nought and a division by it', () => {
    for (const text of ['', '20:', ':1', 'ten', '1:2:3', '0', '1:0', '0x10', 'Infinity'])
      expect(parseFactor(text)).toBeNull();
  });
});
