import { describe, expect, it } from 'vitest';
import { evenWheel } from '../testing/even-wheel.ts';
import { derivative, integral } from './change.ts';
import { derive } from './derive.ts';
import { lowPass } from './low-pass.ts';
import { movingMean } from './moving-mean.ts';
import { speedFromTeeth } from './tooth-speed.ts';
import type { DeriveInput } from './types.ts';

const even = (count: number, stepS = 0.001) => ({ kind: 'even', startS: 0, stepS, count }) as const;
const of = (n: number, make: (i: number) => number) => Float32Array.from({ length: n }, (_, i) => make(i));

describe('lowPass()', () => {
  it('leaves a slow sine as it is, unshifted, half of one at the cut-off, and next to nothing of a fast one', () => {
    const sine = (hz: number) => of(4000, (i) => Math.sin((2 * Math.PI * hz * i) / 1000));
    const heightOf = (values: Float32Array) => Math.max(...values.subarray(1500, 2500));
    expect(heightOf(lowPass(sine(2), 1000, 50))).toBeCloseTo(1, 3);
    expect(lowPass(sine(2), 1000, 50)[2125]!).toBeCloseTo(sine(2)[2125]!, 3);
    // Butterworth: 1/sqrt(2) at the cut-off, twice.
    expect(heightOf(lowPass(sine(50), 1000, 50))).toBeCloseTo(0.5, 2);
    expect(heightOf(lowPass(sine(400), 1000, 50))).toBeLessThan(0.001);
  });

  it('keeps a level exactly, ends a run at a hole, and does nothing above half the sample rate', () => {
    const values = of(100, () => 11.8);
    values[50] = Number.NaN;
    const made = lowPass(values, 1000, 20);
    expect(made[0]).toBeCloseTo(11.8, 5);
    expect(made[99]).toBeCloseTo(11.8, 5);
    expect(made[50]).toBeNaN();
    expect([...lowPass(values.subarray(0, 9), 1000, 20)].every(Number.isNaN)).toBe(true);
    expect([
      ...lowPass(
        of(5, (i) => i),
        1000,
        500,
      ),
    ]).toEqual([0, 1, 2, 3, 4]);
  });
});

describe('movingMean()', () => {
  it('is centred, shrinks at both ends, and stops at a hole', () => {
    expect(
      [
        ...movingMean(
          of(7, (i) => i * i),
          3,
        ),
      ].map((value) => Number(value.toFixed(4))),
    ).toEqual([0, 1.6667, 4.6667, 9.6667, 16.6667, 25.6667, 36]);
    const hole = of(5, () => 2);
    hole[2] = Number.NaN;
    expect([...movingMean(hole, 5)]).toEqual([2, 2, Number.NaN, 2, 2]);
  });
});

describe('derivative() and integral()', () => {
  it('give the slope of a ramp and the area under it', () => {
    const ramp = of(1001, (i) => 3 * i * 0.001);
    expect(derivative(ramp, even(1001))[500]).toBeCloseTo(3, 3);
    expect(derivative(ramp, even(1001))[0]).toBeCloseTo(3, 3);
    expect(integral(ramp, even(1001))[1000]).toBeCloseTo(1.5, 5);
  });

  it('hold where values hold, and add nothing over a hole', () => {
    const axis = { kind: 'uneven', timesS: Float64Array.from([0, 1, 3]), holds: true } as const;
    expect([...integral(Float32Array.from([2, 4, 0]), axis)]).toEqual([0, 2, 10]);
    const holes = Float32Array.from([1, 1, Number.NaN, 1, 1]);
    const made = integral(holes, even(5, 1));
    expect([...made]).toEqual([0, 1, Number.NaN, 1, 2]);
    expect(derivative(holes.subarray(1, 3), even(2, 1))[0]).toBeNaN();
  });
});

describe('speedFromTeeth()', () => {
  it('is the wheel’s speed over its teeth and unknown outside', () => {
    const wheel = evenWheel({ rpm: 200, turns: 2, firstMarkS: 0.1 });
    const made = speedFromTeeth(even(900), wheel);
    expect(made[50]).toBeNaN();
    expect(made[300]).toBeCloseTo(200, 3);
    expect(made[400]).toBeCloseTo(200, 3);
    expect(made[899]).toBeNaN();
  });
});

describe('derive()', () => {
  const input: DeriveInput = {
    axis: even(4, 1),
    source: (column) =>
      [
        { name: 'A', unit: 'V', values: Float32Array.from([1, -2, Number.NaN, 4]) },
        { name: 'B', unit: 'V', values: Float32Array.from([1, 1, 1, 1]) },
        { name: 'I', unit: 'A', values: new Float32Array(4) },
      ][column],
    wheelOf: () => null,
  };

  it('takes one signal from another of the same unit, holes staying holes', () => {
    const made = derive({ kind: 'difference', of: 0, less: 1 }, input);
    expect([...made.values]).toEqual([0, -3, Number.NaN, 3]);
    expect(made).toMatchObject({ name: 'A − B', unit: 'V', reason: null });
    expect([...derive({ kind: 'absolute', of: 0 }, input).values]).toEqual([1, 2, Number.NaN, 4]);
    expect(derive({ kind: 'derivative', of: 0 }, input).unit).toBe('V/s');
    expect(derive({ kind: 'integral', of: 0 }, input).unit).toBe('V.s');
  });

  it('says why where nothing can be made, and gives holes then', () => {
    const holds = { ...input, axis: { kind: 'uneven', timesS: new Float64Array(4), holds: true } as const };
    for (const [made, reason] of [
      [derive({ kind: 'difference', of: 0, less: 2 }, input), /V and A/],
      [derive({ kind: 'difference', of: 0, less: 9 }, input), /not there any more/],
      [derive({ kind: 'absolute', of: 9 }, input), /not there any more/],
      [derive({ kind: 'speed', of: 0 }, input), /no trigger wheel/],
      [derive({ kind: 'low-pass', of: 0, cutoffHz: 5 }, holds), /even steps/],
    ] as const) {
      expect(made.reason).toMatch(reason);
      expect([...made.values].every(Number.isNaN)).toBe(true);
    }
  });
});
