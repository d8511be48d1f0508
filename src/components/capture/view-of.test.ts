import { describe, expect, it } from 'vitest';
import { createPlotModel } from '../plot/model.ts';
import { turnsOf } from '../plot/steps.ts';
import { evenWheel } from '../plot/testing.ts';
import { bringIntoView, openingView, presetOf, samplesIn } from './view-of.ts';

const turns = turnsOf(evenWheel({ rpm: 200, turns: 4, firstMarkS: 0.1 }));

describe('openingView() and presetOf()', () => {
  it('open at the second of several turns, and know it as a turn', () => {
    const view = openingView(turns, false)!;
    expect(view.from).toBeCloseTo(0.37, 9);
    expect(presetOf(view, { from: 0, to: 1.4 }, turns, 58)).toBe('step');
    expect(openingView(null, false)).toBeNull();
  });
});

describe('bringIntoView()', () => {
  it('goes to samples that are out of view and stays where they are well in view', () => {
    const model = createPlotModel(
      { startS: 0, durationS: 10, samples: 1001, samplesVersion: 1, axis: 'even', signals: [] },
      () => new Promise(() => {}),
      { from: 0, to: 1 },
    );
    bringIntoView(model, { from: 0.4, to: 0.6 });
    expect(model.view.get()).toEqual({ from: 0, to: 1 });
    bringIntoView(model, { from: 5, to: 6 });
    expect(model.view.get().from).toBeCloseTo(3.8, 9);
    bringIntoView(model, { from: 8, to: 8 });
    expect((model.view.get().from + model.view.get().to) / 2).toBeCloseTo(8, 9);
  });
});

describe('samplesIn()', () => {
  it('counts both ends of an even axis and knows no count on an uneven one', () => {
    const capture = { samples: 1001, startS: -1, durationS: 10, axis: 'even' as const };
    expect(samplesIn(capture, { from: 0, to: 0.1 })).toBe(11);
    expect(samplesIn(capture, { from: -5, to: 50 })).toBe(1001);
    expect(samplesIn({ ...capture, axis: 'uneven' }, { from: 0, to: 1 })).toBeNull();
  });
});
