import { describe, expect, it } from 'vitest';
import type { ColumnsWindow, SamplesWindow } from './decode-window.ts';
import {
  bestWindow,
  emptyCache,
  neededRequest,
  requestFor,
  willDo,
  withOverview,
  withWindow,
} from './window-cache.ts';

const columns = (from: number, to: number, count: number): ColumnsWindow => ({
  layout: 'columns',
  from,
  to,
  count,
  samplesVersion: 1,
  signals: new Map(),
});
const samples = (from: number, to: number): SamplesWindow => ({
  layout: 'samples',
  from,
  to,
  count: 0,
  samplesVersion: 1,
  holds: false,
  even: true,
  times: new Float64Array(0),
  signals: new Map(),
});
const whole = { from: 0, to: 100 };
const overview = columns(0, 100, 1000);

describe('bestWindow()', () => {
  it('shows the coarse overview at once and the finer window when it has come', () => {
    const view = { from: 10, to: 20 };
    const coarse = withOverview(emptyCache, overview);
    expect(bestWindow(coarse, view, 1000)).toBe(overview);
    const finer = columns(5, 25, 2000);
    expect(bestWindow(withWindow(coarse, finer), view, 1000)).toBe(finer);
  });

  it('prefers the window with fewest points among those fine enough', () => {
    const fine = columns(0, 100, 8000);
    const cache = withWindow(withOverview(emptyCache, overview), fine);
    expect(bestWindow(cache, whole, 1000)).toBe(overview);
    expect(bestWindow(cache, { from: 0, to: 20 }, 1000)).toBe(fine);
  });

  it('takes every sample of a near window over columns, and nothing where nothing came', () => {
    const near = samples(10, 11);
    const cache = withWindow(withOverview(emptyCache, overview), near);
    expect(bestWindow(cache, { from: 10.2, to: 10.4 }, 1000)).toBe(near);
    expect(bestWindow(cache, { from: 10.8, to: 11.4 }, 1000)).toBe(overview);
    expect(bestWindow(emptyCache, whole, 1000)).toBeNull();
  });
});

describe('neededRequest()', () => {
  it('asks with a margin on both sides and nothing more while the view stays inside it', () => {
    const cache = withOverview(emptyCache, overview);
    const view = { from: 40, to: 50 };
    const request = neededRequest(cache, view, 1000, whole)!;
    expect(request.from).toBeLessThanOrEqual(35);
    expect(request.to).toBeGreaterThanOrEqual(55);
    const answered = withWindow(cache, columns(request.from, request.to, request.columns));
    expect(neededRequest(answered, { from: 43, to: 53 }, 1000, whole)).toBeNull();
    expect(neededRequest(answered, { from: 60, to: 70 }, 1000, whole)).not.toBeNull();
  });

  it('asks nothing for the whole capture once the overview is there', () => {
    expect(neededRequest(withOverview(emptyCache, overview), whole, 1000, whole)).toBeNull();
  });

  it('asks nothing more where every sample is there already', () => {
    const cache = withWindow(withOverview(emptyCache, overview), samples(10, 20));
    expect(neededRequest(cache, { from: 12, to: 12.001 }, 2000, whole)).toBeNull();
  });
});

describe('requestFor()', () => {
  it('stays inside the capture and the limit of columns', () => {
    const request = requestFor({ from: 0, to: 100 }, 5000, whole);
    expect(request).toMatchObject({ from: 0, to: 100, columns: 5000 });
    expect(requestFor({ from: 90, to: 100 }, 7000, whole).columns).toBeLessThanOrEqual(8192);
  });

  it('gives the same address for views that differ little, and its answer will do for the view', () => {
    const a = requestFor({ from: 40.01, to: 50.01 }, 1000, whole);
    const b = requestFor({ from: 40.02, to: 50.02 }, 1000, whole);
    expect([a.from, a.to]).toEqual([b.from, b.to]);
    expect(willDo(a, { from: 40.01, to: 50.01 }, 1000)).toBe(true);
    expect(willDo(a, { from: 40.01, to: 41 }, 1000)).toBe(false);
  });
});
