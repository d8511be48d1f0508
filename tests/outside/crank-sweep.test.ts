/**
 * Every wheel × sensor × hardship of the accuracy list, made from the geometry, which is the truth: never a wrong number,
 * and no fewer right ones than have been reached. `npm run bench -- crank-sweep` runs more seeds and prints a table.
 */
import { describe, expect, test } from 'vitest';
import {
  HARDSHIPS,
  judged,
  measureSwept,
  SENSORS,
  SWEPT_WHEELS,
  sweptSignal,
} from '../../src/engine/testing/crank-cases.ts';

/** Share of the cases that must be answered, a turn at either end left out or not. */
const ANSWERED: Readonly<Record<string, number>> = { undersampled: 0.4, 'all and spin-up': 0.85 };
const USUALLY_ANSWERED = 0.88;

describe.each(SENSORS)('measureCapture() on every wheel under a %s sensor', (sensor) => {
  const hardships = Object.keys(HARDSHIPS).filter(
    (name) => sensor === 'crank-vr' || !HARDSHIPS[name]!.pickupOnly,
  );
  test.each(hardships)('is never wrong, and mostly right: %s', async (hardship) => {
    const wrong: string[] = [];
    let answered = 0;
    let cases = 0;
    for (const [i, wheel] of Object.keys(SWEPT_WHEELS).entries()) {
      // The runner's own messages get their turn.
      await new Promise((done) => setImmediate(done));
      // Another seed for each wheel: shape, rate, lead order and speed change with it.
      for (const seed of [1 + (i % 6), 7 + (i % 5)]) {
        const swept = { wheel, sensor, hardship, seed };
        const signal = sweptSignal(swept);
        const { outcome, why } = judged(swept, signal, measureSwept(swept, signal));
        cases += 1;
        if (outcome === 'wrong') wrong.push(`${wheel}, seed ${seed}: ${why}`);
        if (outcome === 'right' || outcome === 'short') answered += 1;
      }
    }
    expect(wrong).toEqual([]);
    expect(answered / cases).toBeGreaterThanOrEqual(ANSWERED[hardship] ?? USUALLY_ANSWERED);
  });
});
