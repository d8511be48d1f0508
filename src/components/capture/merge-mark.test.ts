import { describe, expect, it } from 'vitest';
import { type MarkFields, mergeMark } from './merge-mark.ts';

const began: MarkFields = { kind: 'point', signal: 0, from: 0.1, to: null, value: 1.5, text: 'chip?' };

describe('mergeMark()', () => {
  it('keeps both people’s changes where they touch different things', () => {
    const mine = { ...began, text: 'chipped tooth' };
    const theirs = { ...began, from: 0.2, value: 1.7 };
    expect(mergeMark(began, mine, theirs)).toEqual({
      merged: { ...began, text: 'chipped tooth', from: 0.2, value: 1.7 },
      clashes: [],
    });
  });

  it('names what both changed, and takes mine until a person chooses', () => {
    const { merged, clashes } = mergeMark(began, { ...began, text: 'a' }, { ...began, text: 'b', from: 0.3 });
    expect(merged).toEqual({ ...began, text: 'a', from: 0.3 });
    expect(clashes).toEqual(['text']);
  });

  it('has no clash where both came to the same', () => {
    const same = { ...began, text: 'same' };
    expect(mergeMark(began, same, same)).toEqual({ merged: same, clashes: [] });
  });
});
