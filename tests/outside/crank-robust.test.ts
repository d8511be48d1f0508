/** Accuracy to reach and what must not change it: made signals whose truth is known from the geometry. */
import { describe, expect, test } from 'vitest';
import {
  type CrankSignalOptions,
  crankSignal,
  dividedWheel,
  steady,
} from '../../src/engine/testing/crank-signal.ts';
import { random } from '../../src/engine/testing/random.ts';
import type { IrregularTooth } from '../../src/engine/value.ts';
import { codes, measure, measureSignal, number, value } from './crank-support.ts';

const wheels = {
  '60-2': { teethDeg: dividedWheel(60, [58, 59]), widthDeg: 6 },
  '36-1': { teethDeg: dividedWheel(36, [35]), widthDeg: 10 },
  '36-2': { teethDeg: dividedWheel(36, [34, 35]), widthDeg: 10 },
} as const;

const hardships: Record<string, Partial<CrankSignalOptions>> = {
  'white noise of 20 % of a peak': { noise: 0.2 },
  'hum of 20 % of a peak': { hum: 0.2 },
  'noise and hum together': { noise: 0.2, hum: 0.2 },
  'steps of 8 bits': { bits: 8 },
  'speed dips of 30 %': { dip: 0.3 },
  'run-out of 35 %': { runOut: 0.35 },
  'a spin-up from rest': { spinUpS: 0.2, durationS: 2 },
  'a slow, wide wander of the baseline': { drift: 3, offset: 2.5 },
  'spark spikes three peaks high': { spikes: 15 },
  'clipped peaks': { clip: 1 },
};

describe.each(Object.entries(wheels))('measureCapture() on a %s pick-up', (name, geometry) => {
  test.each(Object.entries(hardships))(
    'counts exactly and keeps speed and polarity through %s',
    (what, hardship) => {
      for (const seed of [1, 2]) {
        const rng = random(seed * 97 + what.length);
        const signal = crankSignal({
          ...steady,
          ...geometry,
          seed,
          rpm: rng.between(130, 300),
          inverted: seed === 2,
          // Away from the capture's ends, where a tooth may or may not count.
          startDeg: -rng.between(40, 320),
          ...hardship,
        });
        const found = measureSignal(signal, 'crank-vr');
        expect(value(found, 'wheel_pattern').value).toBe(name);
        expect(value(found, 'polarity').value).toBe(seed === 2 ? 'inverted' : 'normal');
        const turns = signal.marksS.length - 1;
        const endsAtMark = signal.samples.length * signal.stepS - signal.marksS.at(-1)! < 0.01;
        expect(turns - number(found, 'rev_count')).toBeLessThanOrEqual(endsAtMark ? 1 : 0);
        expect(turns - number(found, 'rev_count')).toBeGreaterThanOrEqual(0);
        const rpm = (60 * turns) / (signal.marksS.at(-1)! - signal.marksS[0]!);
        if (number(found, 'rev_count') === turns)
          expect(Math.abs(number(found, 'rpm_mean') / rpm - 1)).toBeLessThan(0.005);
      }
    },
  );
});

describe('measureCapture() on one weak, clipped, dead or sparse signal', () => {
  test('names the weak tooth, and only it', () => {
    const found = measureSignal(
      crankSignal({ ...steady, weak: { tooth: 20, height: 0.6 }, noise: 0.02 }),
      'crank-vr',
    );
    const list = value(found, 'irregular_teeth').value as readonly IrregularTooth[];
    expect(list.map((tooth) => tooth.tooth)).toEqual([20]);
    expect(list[0]!.height_ratio).toBeGreaterThan(0.5);
    expect(list[0]!.height_ratio).toBeLessThan(0.7);
    expect(codes(found)).toContain('irregular-tooth');
  });

  test('names a tooth one degree off its place as late', () => {
    const teethDeg = wheels['60-2'].teethDeg.map((deg) => (deg === 120 ? 121 : deg));
    const found = measureSignal(crankSignal({ ...steady, teethDeg, sampleRateHz: 50_000 }), 'crank-vr');
    const list = value(found, 'irregular_teeth').value as readonly IrregularTooth[];
    expect(list.map((tooth) => tooth.tooth)).toEqual([21]);
    expect(list[0]!.spacing_ratio).toBeGreaterThan(1.1);
  });

  test('says that a clipped peak is a lower bound', () => {
    const found = measureSignal(crankSignal({ ...steady, clip: 1 }), 'crank-vr');
    expect(codes(found)).toContain('clipped-peaks');
  });

  test('says which sample rate would do when there are few samples a tooth', () => {
    const found = measureSignal(crankSignal({ ...steady, sampleRateHz: 1200 }), 'crank-vr');
    expect(codes(found)).toContain('low-sample-rate');
    expect(found.signals[0]!.notices.find((n) => n.code === 'low-sample-rate')!.text).toMatch(
      /[\d,]+ samples a second/,
    );
  });

  test('gives nulls with a reason on a flat line, a floating input, hum alone and noise alone', () => {
    const count = 30_000;
    const rng = random(5);
    const traces: Record<string, Float32Array> = {
      flat: new Float32Array(count).fill(2.5),
      empty: new Float32Array(count).fill(Number.NaN),
      noise: Float32Array.from({ length: count }, () => rng.normal()),
      hum: Float32Array.from(
        { length: count },
        (_, i) => Math.sin((2 * Math.PI * 50 * i) / 20_000) + 0.05 * rng.normal(),
      ),
      wander: Float32Array.from({ length: count }, (_, i) => Math.sin(i / 9000) + 0.01 * rng.normal()),
    };
    for (const [name, samples] of Object.entries(traces)) {
      for (const circuit of ['crank-vr', 'crank-hall', 'cam-hall', 'cam-vr'] as const) {
        const found = measure({ kind: 'even', startS: 0, stepS: 5e-5, count }, [[circuit, samples]]);
        for (const { key, value: got, reason } of found.signals[0]!.values) {
          if (['wheel_pattern', 'teeth_present', 'rev_count', 'rpm_mean', 'polarity'].includes(key)) {
            expect(got, `${name} ${circuit} ${key}`).toBeNull();
          }
          if (got === null) expect(reason).toBeTruthy();
        }
      }
    }
  });

  test('counts a turn when the capture holds two gaps, and none when it holds one', () => {
    const two = measureSignal(crankSignal({ ...steady, startDeg: -60, durationS: 0.4 }), 'crank-vr');
    expect(number(two, 'rev_count')).toBe(1);
    const one = measureSignal(crankSignal({ ...steady, startDeg: -150, durationS: 0.3 }), 'crank-vr');
    expect(value(one, 'rev_count').value).toBeNull();
    expect(value(one, 'rev_count').reason).toContain('no reference mark');
  });
});

describe('what must not change the result', () => {
  const base = crankSignal({ ...steady, noise: 0.05, sampleRateHz: 20_000 });
  const axis = { kind: 'even', startS: 0, stepS: base.stepS, count: base.samples.length } as const;
  const plain = measure(axis, [['crank-vr', base.samples]]);
  const keys = ['wheel_pattern', 'rev_count', 'polarity'] as const;
  const same = (other: ReturnType<typeof measure>, digits = 3) => {
    for (const key of keys) expect(value(other, key).value).toEqual(value(plain, key).value);
    expect(number(other, 'rpm_mean')).toBeCloseTo(number(plain, 'rpm_mean'), digits);
  };

  test('a shift of time moves the marks by as much and nothing else', () => {
    const moved = measure({ ...axis, startS: -12.5 }, [['crank-vr', base.samples]]);
    same(moved, 6);
    expect(moved.wheel!.marksS[0]! + 12.5).toBeCloseTo(plain.wheel!.marksS[0]!, 9);
  });

  test('scale and offset change heights only', () => {
    same(measure(axis, [['crank-vr', base.samples.map((v) => v * 37)]]));
    same(measure(axis, [['crank-vr', base.samples.map((v) => v + 4)]]), 2);
    expect(number(measure(axis, [['crank-vr', base.samples.map((v) => v * 4)]]), 'peak_to_peak')).toBeCloseTo(
      4 * number(plain, 'peak_to_peak'),
      3,
    );
  });

  test('mirrored leads turn the polarity and nothing else', () => {
    const mirrored = measure(axis, [['crank-vr', base.samples.map((v) => -v)]]);
    expect(value(mirrored, 'polarity').value).toBe('inverted');
    expect(number(mirrored, 'rev_count')).toBe(number(plain, 'rev_count'));
    expect(number(mirrored, 'rpm_mean')).toBeCloseTo(number(plain, 'rpm_mean'), 3);
  });

  test('every second sample gives the same turns', () => {
    const half = base.samples.filter((_, i) => i % 2 === 0);
    same(measure({ ...axis, stepS: axis.stepS * 2, count: half.length }, [['crank-vr', half]]), 0);
  });

  test('evidence stays short and within the capture, and every null has its reason', () => {
    for (const v of plain.signals[0]!.values) {
      expect(v.evidence.length).toBeLessThanOrEqual(50);
      if (v.value === null) expect(v.reason).toBeTruthy();
      else expect(v.evidence.length).toBeGreaterThan(0);
      for (const { from, to } of v.evidence) {
        expect(from).toBeGreaterThanOrEqual(0);
        expect(to).toBeLessThanOrEqual(axis.count * axis.stepS);
        expect(to).toBeGreaterThanOrEqual(from);
      }
    }
  });

  test('degrees of the wheel rise strictly and are 0 at the first mark', () => {
    const { teethDeg, teethS, marksS } = plain.wheel!;
    expect(teethDeg[teethS.indexOf(marksS[0]!)]).toBe(0);
    for (let k = 1; k < teethDeg.length; k += 1) {
      expect(teethDeg[k]!).toBeGreaterThan(teethDeg[k - 1]!);
      expect(teethS[k]!).toBeGreaterThan(teethS[k - 1]!);
    }
  });
});
