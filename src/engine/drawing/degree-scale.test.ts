import { describe, expect, it } from 'vitest';
import { evenWheel } from '../testing/even-wheel.ts';
import { degreeScale } from './degree-scale.ts';

const wheel = evenWheel({ rpm: 200, turns: 3, firstMarkS: 0.1 });

describe('degreeScale()', () => {
  it('labels one turn every 30 degrees at 3 px a degree and starts again at the mark', () => {
    const scale = degreeScale(wheel, { from: 0.1, to: 0.4 }, 1080)!;
    expect(scale.degrees.map((label) => label.text).slice(0, 3)).toEqual(['0°', '30°', '60°']);
    expect(scale.degrees.at(-1)).toMatchObject({ text: '0°', reference: true });
    expect(scale.degrees[1]!.at).toBeCloseTo(90, 6);
  });

  it('breaks the bar at the gap of the missing teeth', () => {
    const scale = degreeScale(wheel, { from: 0.1, to: 0.4 }, 1080)!;
    // Tooth 58 stands at 342 degrees, the mark at 360: nothing between 1026 and 1080 px.
    expect(Math.max(...scale.fields.map((field) => field.to))).toBeCloseTo(1026, 6);
    expect(scale.fields[0]).toMatchObject({ dark: true });
    expect(scale.fields[1]).toMatchObject({ dark: false });
  });

  it('numbers teeth from the reference mark and thins the numbers out', () => {
    const scale = degreeScale(wheel, { from: 0.1, to: 0.4 }, 1080)!;
    expect(scale.toothNumbers.slice(0, 4).map(({ tooth }) => tooth)).toEqual([1, 2, 4, 6]);
    expect(scale.toothNumbers[0]).toMatchObject({ tooth: 1 });
    for (let i = 1; i < scale.toothNumbers.length; i += 1) {
      const { at, tooth } = scale.toothNumbers[i]!;
      const expected = tooth === 1 ? 1080 : (tooth - 1) * 18;
      expect(at).toBeCloseTo(expected, 6);
    }
    expect(scale.turns).toMatchObject([{ turn: 0 }]);
    expect(scale.turns[0]!.rpm).toBeCloseTo(200, 9);
  });

  it('keeps the same numbers when the view starts in the middle of a turn', () => {
    const scale = degreeScale(wheel, { from: 0.2, to: 0.35 }, 1080)!;
    // 0.25 s is 150 ms after the mark: tooth 31 at 180 degrees.
    const tooth31 = scale.toothNumbers.find(({ at }) => Math.abs(at - 360) < 1);
    expect(tooth31?.tooth ?? 31).toBe(31);
    for (const { at, tooth } of scale.toothNumbers) {
      expect((at / 1080) * 0.15 + 0.2).toBeCloseTo(0.1 + (tooth - 1) * 0.005, 6);
    }
  });

  it('stays in seconds where no tooth was seen', () => {
    expect(degreeScale(wheel, { from: 0, to: 0.09 }, 800)).toBeNull();
    expect(
      degreeScale({ ...wheel, teethS: [], teethDeg: [], marksS: [] }, { from: 0, to: 1 }, 800),
    ).toBeNull();
  });

  it('draws at most a field every few pixels over hundreds of turns', () => {
    const long = evenWheel({ rpm: 1200, turns: 200 });
    const scale = degreeScale(long, { from: 0, to: 10 }, 360)!;
    expect(scale.fields.length).toBeLessThan(410);
    expect(scale.teeth).toEqual([]);
    expect(scale.toothNumbers).toEqual([]);
  });
});
