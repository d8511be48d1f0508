import { describe, expect, it } from 'vitest';
import { turnsOf } from '../plot/steps.ts';
import { evenWheel } from '../plot/testing.ts';
import { acrossAt, degreeRows, timeRows } from './rows-of.ts';

const wheel = evenWheel({ rpm: 200, turns: 3, firstMarkS: 0.1 });

describe('degreeRows()', () => {
  it('lays each complete turn from its mark, and the parts before and after', () => {
    const withParts = {
      ...wheel,
      teethS: [0.05, ...wheel.teethS, 1.05],
      teethDeg: [-60, ...wheel.teethDeg, 1140],
    };
    const rows = degreeRows(withParts, 360)!;
    expect(rows.rows.map(({ name, part }) => [name, part])).toEqual([
      ['Part', 'start'],
      ['Turn 1', null],
      ['Turn 2', null],
      ['Turn 3', null],
      ['Part', 'end'],
    ]);
    expect(acrossAt(rows.rows[0]!, 'deg', withParts, 0.05)).toBeCloseTo(300, 9);
    expect(acrossAt(rows.rows[2]!, 'deg', withParts, 0.55)).toBeCloseTo(180, 9);
    expect(acrossAt(rows.rows[4]!, 'deg', withParts, 1.05)).toBeCloseTo(60, 9);
  });

  it('lays cycles of two turns; what is left over is a part', () => {
    const rows = degreeRows(wheel, 720)!;
    expect(rows.across).toEqual({ from: 0, to: 720 });
    expect(rows.rows.map(({ name }) => name)).toEqual(['Turns 1, 2', 'Part']);
    expect(rows.rows[1]?.stretch.from).toBeCloseTo(0.7, 9);
  });

  it('is nothing without a complete turn', () => {
    expect(degreeRows({ ...wheel, marksS: [0.1] }, 360)).toBeNull();
  });
});

describe('timeRows()', () => {
  it('lays firings on their switch-off, however long each is', () => {
    const rows = timeRows({
      word: 'Firing',
      stretches: [
        { from: 1, to: 1.01 },
        { from: 2, to: 2.02 },
      ],
      margin: 0,
      originsS: [1.004, 2.008],
      total: 2,
    })!;
    expect(rows.across.from).toBeCloseTo(-0.008, 9);
    expect(rows.across.to).toBeCloseTo(0.012, 9);
    expect(acrossAt(rows.rows[1]!, 's', null, 2.008)).toBeCloseTo(0, 9);
  });

  it('lays turns from their marks', () => {
    const rows = timeRows(turnsOf(wheel)!)!;
    expect(rows.rows[0]?.name).toBe('Turn 1');
    expect(rows.across.to).toBeCloseTo(0.3, 9);
  });
});
