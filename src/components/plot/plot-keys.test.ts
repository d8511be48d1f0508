import { describe, expect, it } from 'vitest';
import { createPlotModel } from './model.ts';
import { actOnKey } from './plot-keys.ts';
import { stepInView, turnsOf } from './steps.ts';
import { evenWheel } from './testing.ts';

const wheel = evenWheel({ rpm: 200, turns: 3, firstMarkS: 0.1 });
const make = () => {
  const model = createPlotModel(
    { startS: 0, durationS: 1.2, samples: 60_001, samplesVersion: 1, axis: 'even', signals: [] },
    () => new Promise(() => {}),
    null,
  );
  model.steps.set(turnsOf(wheel));
  return model;
};
const none = { mark: () => {}, help: () => {} };

describe('actOnKey()', () => {
  it('n and p step through the turns and stop at the ends', () => {
    const model = make();
    actOnKey('n', false, model, none);
    actOnKey('n', false, model, none);
    actOnKey('n', false, model, none);
    expect(stepInView(model)).toBe(2);
    actOnKey('p', false, model, none);
    expect(stepInView(model)).toBe(1);
    expect(model.view.get().from).toBeCloseTo(0.37, 9);
  });

  it('+ zooms at the cursor, 0 shows all, arrows move by a tenth', () => {
    const model = make();
    model.cursorS.set(0.3);
    actOnKey('+', false, model, none);
    const { from, to } = model.view.get();
    expect((0.3 - from) / (to - from)).toBeCloseTo(0.25, 9);
    actOnKey('ArrowRight', false, model, none);
    expect(model.view.get().from).toBeCloseTo(from + (to - from) / 10, 9);
    actOnKey('0', false, model, none);
    expect(model.view.get()).toEqual({ from: 0, to: 1.2 });
  });

  it('s puts a span into the view and takes it away; other keys are left to the page', () => {
    const model = make();
    actOnKey('s', false, model, none);
    expect(model.span.get()?.from).toBeCloseTo(0.4, 9);
    actOnKey('s', false, model, none);
    expect(model.span.get()).toBeNull();
    expect(actOnKey('Tab', false, model, none)).toBe(false);
    expect(actOnKey('/', false, model, none)).toBe(false);
  });
});
