import { describe, expect, it } from 'vitest';
import { createPlotModel } from './model.ts';
import { actOnKey, turnInView } from './plot-keys.ts';
import { evenWheel } from './testing.ts';

const wheel = evenWheel({ rpm: 200, turns: 3, firstMarkS: 0.1 });
const make = () =>
  createPlotModel(
    { startS: 0, durationS: 1.2, samples: 60_001, samplesVersion: 1, axis: 'even', signals: [] },
    () => new Promise(() => {}),
    null,
  );
const none = { mark: () => {}, help: () => {} };

describe('actOnKey()', () => {
  it('n and p step through the turns and stop at the ends', () => {
    const model = make();
    actOnKey('n', false, model, wheel, none);
    actOnKey('n', false, model, wheel, none);
    actOnKey('n', false, model, wheel, none);
    expect(turnInView(model, wheel)).toBe(2);
    actOnKey('p', false, model, wheel, none);
    expect(turnInView(model, wheel)).toBe(1);
    expect(model.view.get().from).toBeCloseTo(0.37, 9);
  });

  it('+ zooms at the cursor, 0 shows all, arrows move by a tenth', () => {
    const model = make();
    model.cursorS.set(0.3);
    actOnKey('+', false, model, wheel, none);
    const { from, to } = model.view.get();
    expect((0.3 - from) / (to - from)).toBeCloseTo(0.25, 9);
    actOnKey('ArrowRight', false, model, wheel, none);
    expect(model.view.get().from).toBeCloseTo(from + (to - from) / 10, 9);
    actOnKey('0', false, model, wheel, none);
    expect(model.view.get()).toEqual({ from: 0, to: 1.2 });
  });

  it('s puts a span into the view and takes it away; other keys are left to the page', () => {
    const model = make();
    actOnKey('s', false, model, null, none);
    expect(model.span.get()?.from).toBeCloseTo(0.4, 9);
    actOnKey('s', false, model, null, none);
    expect(model.span.get()).toBeNull();
    expect(actOnKey('Tab', false, model, null, none)).toBe(false);
    expect(actOnKey('/', false, model, null, none)).toBe(false);
  });
});
