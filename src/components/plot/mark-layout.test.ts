import { describe, expect, it } from 'vitest';
import { layLanes } from './lanes.ts';
import { placeMarks } from './mark-layout.ts';
import type { PlotMark } from './types.ts';

const lanes = layLanes(
  [0, 1].map((index) => ({
    signal: { index, name: `s${index}`, circuit: 'other', unit: 'V', factor: 1, offset: 0 },
    role: 'other',
    dash: [],
  })),
  504,
  null,
);
const mark = (over: Partial<PlotMark>): PlotMark => ({
  id: 'm',
  kind: 'point',
  signal: 0,
  from: 0.5,
  to: null,
  value: 0,
  text: 'Tooth 23 short',
  author: 'A',
  ...over,
});
const view = { from: 0, to: 1 };

describe('placeMarks()', () => {
  it('puts the point at its own time and value and the balloon at the top of its lane', () => {
    const [placed] = placeMarks([mark({ signal: 1 })], lanes, view, 800);
    expect(placed!.point).toEqual({ x: 400, y: lanes[1]!.top + 125 });
    expect(placed!.balloon.y).toBe(lanes[1]!.top + 24);
    expect(placed!.number).toBe(1);
  });

  it('leaves out what is outside the view but keeps the numbers', () => {
    const placed = placeMarks([mark({ from: 3 }), mark({})], lanes, view, 800);
    expect(placed.map(({ number }) => number)).toEqual([2]);
  });

  it('moves a balloon one row down where two would cover each other', () => {
    const placed = placeMarks([mark({}), mark({ from: 0.52 })], lanes, view, 800);
    expect(placed[1]!.balloon.y).toBeGreaterThan(placed[0]!.balloon.y);
  });

  it('turns the text to the left at the right edge', () => {
    expect(placeMarks([mark({ from: 0.97 })], lanes, view, 800)[0]!.side).toBe('left');
  });

  it('shows a level wherever the view is, and a mark of a hidden lane not at all', () => {
    expect(placeMarks([mark({ kind: 'level', from: 9 })], lanes, view, 800)[0]!.level).not.toBeNull();
    expect(placeMarks([mark({ signal: 7 })], lanes, view, 800)).toEqual([]);
  });
});
