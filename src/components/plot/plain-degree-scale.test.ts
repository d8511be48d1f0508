import { describe, expect, it } from 'vitest';
import { plainDegreeScale } from './plain-degree-scale.ts';

describe('plainDegreeScale()', () => {
  it('labels 720 degrees every 30 where there is room and thins out on a phone', () => {
    const desk = plainDegreeScale({ from: 0, to: 720 }, 1180);
    expect(desk.labels.map((label) => label.text).slice(0, 3)).toEqual(['0°', '30°', '60°']);
    const phone = plainDegreeScale({ from: 0, to: 720 }, 320);
    for (let i = 1; i < phone.labels.length; i += 1)
      expect(phone.labels[i]!.at - phone.labels[i - 1]!.at).toBeGreaterThan(40);
  });

  it('fills the whole width with alternate fields, also from the middle of one', () => {
    const { fields } = plainDegreeScale({ from: 40, to: 200 }, 800);
    expect(fields[0]!.from).toBe(0);
    expect(fields.at(-1)!.to).toBeCloseTo(800, 9);
    for (let i = 1; i < fields.length; i += 1) expect(fields[i]!.dark).not.toBe(fields[i - 1]!.dark);
  });
});
