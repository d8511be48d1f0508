import { describe, expect, it } from 'vitest';
import { bandOf, studentT975 } from './band.ts';

describe('studentT975()', () => {
  it('agrees with the table of NIST/SEMATECH e-Handbook 1.3.6.7.2', () => {
    expect(studentT975(2)).toBe(4.303);
    expect(studentT975(10)).toBe(2.228);
  });

  it('agrees with that table beyond its own rows: 2.021 at 40, 1.984 at 100', () => {
    expect(studentT975(40)).toBeCloseTo(2.021, 2);
    expect(studentT975(100)).toBeCloseTo(1.984, 2);
  });
});

describe('bandOf()', () => {
  it('is null for fewer than three values and does not count those that are not finite', () => {
    expect(bandOf([1, 2])).toBeNull();
    expect(bandOf([1, 2, Number.NaN])).toBeNull();
  });

  it('is the 95 % prediction interval: mean ± t s √(1 + 1/n)', () => {
    const band = bandOf([9, 10, 11]);
    expect(band?.middle).toBe(10);
    expect(band?.high).toBeCloseTo(10 + 4.303 * Math.sqrt(4 / 3), 6);
    expect(band?.low).toBeCloseTo(10 - 4.303 * Math.sqrt(4 / 3), 6);
  });

  it('keeps the least half width for equal members', () => {
    expect(bandOf([5, 5, 5], 0.2)).toEqual({ low: 4.8, middle: 5, high: 5.2, n: 3 });
  });

  it('holds 95 % of further members of a normal spread, within 1 %', () => {
    let state = 12345;
    const uniform = () => {
      state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
      return (state + 0.5) / 4294967296;
    };
    const normal = () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
    let held = 0;
    const rounds = 20_000;
    for (let i = 0; i < rounds; i++) {
      const band = bandOf(Array.from({ length: 5 }, normal))!;
      const next = normal();
      if (next >= band.low && next <= band.high) held += 1;
    }
    expect(Math.abs(held / rounds - 0.95)).toBeLessThan(0.01);
  });
});
