/**
 * `compression_balance` against the speed that a made signal really had: s = mean speed less lowest speed of each
 * compression's interval, centred on its lowest speed; 100 · (s / mean(s) − 1). Arithmetic.
 */
import { describe, expect, test } from 'vitest';
import {
  type CrankSignal,
  type CrankSignalOptions,
  crankSignal,
  dividedWheel,
  steady,
} from '../../src/engine/testing/crank-signal.ts';
import {
  changesOnly,
  column,
  evenAxis,
  measure,
  measureSignal,
  sharedFile,
  table,
  value,
} from './crank-support.ts';

const FIRST_DEG = 57;

/** Slow-downs over the intervals about `centreDeg` and the ones after it, in per cent of their mean, from the made speed. */
function truth(signal: CrankSignal, cylinders: number, aboutS: number): number[] {
  const intervalDeg = 720 / cylinders;
  const nearest = Math.round((signal.angleAt(aboutS) - FIRST_DEG) / intervalDeg);
  const endS = signal.samples.length * signal.stepS;
  const timeAt = (deg: number) => {
    let low = 0;
    let high = endS;
    for (let round = 0; round < 50; round += 1) {
      const middle = (low + high) / 2;
      if (signal.angleAt(middle) < deg) low = middle;
      else high = middle;
    }
    return low;
  };
  const slow = Array.from({ length: cylinders }, (_, c) => {
    const from = FIRST_DEG + (nearest + c - 0.5) * intervalDeg;
    const speeds = Array.from({ length: 60 }, (_, i) => {
      const at = from + ((i + 0.5) * intervalDeg) / 60;
      return 1 / (timeAt(at + 1) - timeAt(at - 1));
    });
    return speeds.reduce((sum, speed) => sum + speed, 0) / speeds.length - Math.min(...speeds);
  });
  const mean = slow.reduce((sum, s) => sum + s, 0) / cylinders;
  return slow.map((s) => 100 * (s / mean - 1));
}

const made = (cylinders: number, compressions: readonly number[], more: Partial<CrankSignalOptions> = {}) =>
  crankSignal({
    ...steady,
    cylinders,
    compressions,
    compressionDeg: FIRST_DEG,
    dip: 0.2,
    durationS: 2.5,
    ...more,
  });

describe('compression_balance', () => {
  test.each([
    ['one weak cylinder of four', 4, [1, 1, 0.5, 1], {}],
    ['one dead cylinder of four', 4, [1, 0, 1, 1], {}],
    ['one weak cylinder of six', 6, [1, 1, 1, 0.6, 1, 1], {}],
    ['one weak cylinder of three', 3, [1, 0.7, 1], {}],
    ['one weak cylinder of eight', 8, [1, 1, 1, 1, 1, 0.5, 1, 1], {}],
    ['a weak one through noise', 4, [0.6, 1, 1, 1], { noise: 0.05 }],
    ['a weak one on a wheel of 36-1', 4, [0.6, 1, 1, 1], { teethDeg: dividedWheel(36, [35]), widthDeg: 10 }],
    ['four alike', 4, [1, 1, 1, 1], {}],
  ] as const)('gives %s as the speed had it', (_what, cylinders, compressions, more) => {
    const signal = made(cylinders, compressions, more);
    const found = value(measureSignal(signal, 'crank-vr', cylinders), 'compression_balance');
    const got = found.value as readonly number[];
    const { from, to } = found.evidence[0]!;
    const wanted = truth(signal, cylinders, (from + to) / 2);
    expect(got).toHaveLength(cylinders);
    got.forEach((percent, k) => {
      expect(Math.abs(percent - wanted[k]!), `${got} against ${wanted}`).toBeLessThan(5);
    });
    const weakest = Math.min(...compressions);
    if (weakest < 1) expect(Math.min(...got)).toBeLessThan(-15);
  });

  test('is null with a reason when nothing slows the crank down: an engine without plugs', () => {
    for (const dip of [0, 0.004]) {
      const found = value(
        measureSignal(made(4, [], { dip, noise: 0.02 }), 'crank-vr', 4),
        'compression_balance',
      );
      expect(found.value).toBeNull();
      expect(found.reason).toBeTruthy();
    }
  });

  test('is null when the wheel is out of true, which swings the speed once a turn', () => {
    // An eccentricity of the sensor's circle moves each tooth by up to one degree, once a turn.
    const teethDeg = steady.teethDeg.map((deg) => deg + Math.sin((deg * Math.PI) / 180));
    const found = value(
      measureSignal(made(4, [], { dip: 0.06, teethDeg }), 'crank-vr', 4),
      'compression_balance',
    );
    expect(found.value).toBeNull();
  });

  test('is null where teeth stand unevenly, for their spacing looks like a swing of speed', () => {
    const teethDeg = [...dividedWheel(12, []), 340].sort((a, b) => a - b);
    const signal = made(4, [], { kind: 'two-level', peak: 5, teethDeg, widthDeg: 6 });
    expect(value(measureSignal(signal, 'crank-hall', 4), 'compression_balance').value).toBeNull();
  });

  test('is null without a cylinder count', () => {
    const found = value(measureSignal(made(4, [1, 1, 0.5, 1]), 'crank-vr'), 'compression_balance');
    expect(found.value).toBeNull();
    expect(found.reason).toContain('cylinders');
  });

  // Recorded "no plugs" (../shared/recordings/README.md): nothing is compressed, so nothing may be compared.
  test('is null on a recording of an engine without spark plugs', (context) => {
    const text = sharedFile('recordings', 'edges-12-plus-1.csv');
    if (text === null) return context.skip('skipped: recordings not present');
    const rows = table(text, ',');
    const found = measure(changesOnly(rows), [['crank-hall', column(rows, 1)]], 4);
    expect(value(found, 'compression_balance').value).toBeNull();
  });

  test('says nothing of a recorded 60-2 wheel whose differences come back every turn', (context) => {
    const text = sharedFile('recordings', 'vr-60-2-volts-a.csv');
    if (text === null) return context.skip('skipped: recordings not present');
    const rows = table(text, ',');
    const found = measure(evenAxis(rows), [['crank-vr', column(rows, 1)]], 4);
    expect(value(found, 'compression_balance').value).toBeNull();
  });
});
