import { describe, expect, it } from 'vitest';
import { evenWheel } from '../plot/testing.ts';
import { onCircle, stretchOfTooth, turnToGap, wheelTeeth } from './wheel-geometry.ts';

const wheel = {
  ...evenWheel({ rpm: 200, turns: 3, firstMarkS: 0.1 }),
  signal: 0,
  pattern: '60-2',
  toothHeights: Array.from({ length: 58 }, (_, i) => (i === 22 ? 0.31 : 1)),
  toothAnglesDeg: Array.from({ length: 58 }, (_, i) => i * 6 + (i === 22 ? 0.4 : 0)),
};

describe('wheelTeeth()', () => {
  it('gives each tooth its angle, its height over the mean and how late it is', () => {
    const teeth = wheelTeeth(wheel);
    expect(teeth).toHaveLength(58);
    expect(teeth[22]!.lateDeg).toBeCloseTo(0.4, 9);
    expect(teeth[22]!.height).toBeLessThan(0.35);
    expect(teeth[1]!.lateDeg).toBeCloseTo(0, 9);
    expect(wheelTeeth({ ...wheel, toothHeights: null })[0]!.height).toBeNull();
    expect(wheelTeeth({ ...wheel, places: null })[0]!.lateDeg).toBeNull();
  });
});

describe('turnToGap()', () => {
  it('turns the middle of the missing teeth to the top', () => {
    expect(turnToGap(wheelTeeth(wheel))).toBeCloseTo(-351, 9);
    const [x, y] = onCircle(0, 10);
    expect(x).toBeCloseTo(0, 9);
    expect(y).toBe(-10);
  });
});

describe('stretchOfTooth()', () => {
  it('finds the tooth in the second turn, three teeth to either side', () => {
    const stretch = stretchOfTooth(wheel, 23)!;
    expect((stretch.from + stretch.to) / 2).toBeCloseTo(0.4 + 22 * 0.005, 9);
    expect(stretchOfTooth({ ...wheel, marksS: [] }, 1)).toBeNull();
  });
});
