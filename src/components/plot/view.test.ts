import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { boundsOf, clampView, panBy, pinch, shareOfTime, timeAtShare, viewAround, zoomAt } from './view.ts';

const bounds = boundsOf(-1, 10, 10_001);

describe('zoomAt()', () => {
  it('keeps the time under the pointer where it is', () => {
    const view = { from: 2, to: 4 };
    const next = zoomAt(view, 2.5, 0.5, bounds);
    expect(next.to - next.from).toBeCloseTo(1, 12);
    expect(shareOfTime(next, 2.5)).toBeCloseTo(shareOfTime(view, 2.5), 12);
  });

  it('stops at eight samples and at the whole capture', () => {
    const near = zoomAt({ from: 2, to: 2.01 }, 2.005, 1e-6, bounds);
    expect(near.to - near.from).toBeCloseTo(0.008, 9);
    expect(zoomAt({ from: 2, to: 4 }, 3, 1e6, bounds)).toEqual({ from: -1, to: 9 });
  });
});

describe('clampView(), panBy(), pinch(), viewAround()', () => {
  it('never leave the capture and never turn round', () => {
    const time = fc.double({ min: -50, max: 50, noNaN: true });
    fc.assert(
      fc.property(time, time, time, fc.double({ min: 0, max: 1, noNaN: true }), (a, b, c, share) => {
        const view = clampView({ from: a, to: b }, bounds);
        const views = [
          view,
          panBy(view, c, bounds),
          pinch([a, b], [share, 1 - share], bounds),
          viewAround({ from: Math.min(a, b), to: Math.max(a, b) }, 0.2, bounds),
        ];
        for (const each of views) {
          expect(each.from).toBeGreaterThanOrEqual(-1);
          expect(each.to).toBeLessThanOrEqual(9);
          expect(each.to - each.from).toBeGreaterThanOrEqual(bounds.least * (1 - 1e-9));
        }
      }),
    );
  });

  it('panBy() keeps the length at the end of the capture', () => {
    const moved = panBy({ from: 7, to: 8 }, 100, bounds);
    expect(moved.to).toBe(9);
    expect(moved.from).toBe(8);
  });

  it('pinch() puts both held times under the fingers', () => {
    const view = pinch([3, 5], [0.25, 0.75], bounds);
    expect(timeAtShare(view, 0.25)).toBeCloseTo(3, 12);
    expect(timeAtShare(view, 0.75)).toBeCloseTo(5, 12);
  });

  it('boundsOf() gives a capture of one sample a view that can be drawn', () => {
    const one = boundsOf(2, 0, 1);
    expect(one.whole.to).toBeGreaterThan(one.whole.from);
    expect(clampView({ from: 0, to: 0 }, one)).toEqual(one.whole);
  });
});
