import { describe, expect, it } from 'vitest';
import { createPlotModel } from './model.ts';
import { type Steps, showStep, stepBy, stepInView, turnsOf } from './steps.ts';
import { evenWheel } from './testing.ts';

const make = () =>
  createPlotModel(
    { startS: 0, durationS: 1, samples: 10_001, samplesVersion: 1, axis: 'even', signals: [] },
    () => new Promise(() => {}),
    null,
  );
const firings: Steps = {
  word: 'Firing',
  stretches: [
    { from: 0.1, to: 0.11 },
    { from: 0.4, to: 0.41 },
    { from: 0.7, to: 0.71 },
  ],
  margin: 0.2,
  originsS: null,
  total: 3,
};

describe('stepBy()', () => {
  it('from between two firings goes to the one ahead, then on, and stops at the ends', () => {
    const model = make();
    model.steps.set(firings);
    model.show({ from: 0.2, to: 0.21 });
    stepBy(model, 1);
    expect(stepInView(model)).toBe(1);
    expect(model.view.get().from).toBeCloseTo(0.398, 9);
    expect(model.view.get().to).toBeCloseTo(0.412, 9);
    stepBy(model, 1);
    stepBy(model, 1);
    expect(stepInView(model)).toBe(2);
    model.show({ from: 0.2, to: 0.21 });
    stepBy(model, -1);
    expect(stepInView(model)).toBe(0);
  });

  it('without anything that repeats moves by the length of the view', () => {
    const model = make();
    model.show({ from: 0.2, to: 0.3 });
    stepBy(model, 1);
    expect(model.view.get().from).toBeCloseTo(0.3, 9);
    expect(stepInView(model)).toBeNull();
  });
});

describe('turnsOf()', () => {
  it('gives a stretch for each complete turn and nothing without one', () => {
    const turns = turnsOf(evenWheel({ rpm: 200, turns: 3, firstMarkS: 0.1 }))!;
    expect(turns.stretches.map(({ from }) => Number(from.toFixed(9)))).toEqual([0.1, 0.4, 0.7]);
    expect(turnsOf(evenWheel({ turns: 0 }))).toBeNull();
    expect(turnsOf(null)).toBeNull();
    const model = make();
    model.steps.set(turns);
    showStep(model, 9);
    expect(model.view.get()).toEqual({ from: 0, to: 1 });
  });
});
