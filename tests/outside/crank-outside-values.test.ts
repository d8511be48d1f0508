/** Crank rows of the outside values to check against; the source stands beside each. */
import { describe, expect, test } from 'vitest';
import { placePassages } from '../../src/engine/circuits/wheel/passages.ts';
import { findPickup } from '../../src/engine/circuits/wheel/pickup.ts';
import {
  type CrankSignal,
  crankSignal,
  dividedWheel,
  steady,
} from '../../src/engine/testing/crank-signal.ts';
import { codes, measure, measureSignal, number, value } from './crank-support.ts';

const wheel = (places: number, missing: readonly number[]) => ({
  teethDeg: dividedWheel(places, missing),
  widthDeg: 360 / places,
});

describe('wheels are named as the trade names them', () => {
  // N-M: the first number includes the missing places (Speeduino wiki, "Missing Tooth"). 60-2 and 36-1: maker service
  // texts, common practice. 36-2-2-2: 10 degrees a place, three gaps of two (Speeduino wiki).
  test.each([
    ['60-2', wheel(60, [58, 59]), 58, 2],
    ['36-1', wheel(36, [35]), 35, 1],
    ['36-2', wheel(36, [34, 35]), 34, 2],
    ['24-1', wheel(24, [23]), 23, 1],
    ['12-1', wheel(12, [11]), 11, 1],
    ['36-2-2-2', wheel(36, [1, 2, 16, 17, 34, 35]), 30, 6],
    ['36-2-1', wheel(36, [18, 34, 35]), 33, 3],
  ])('%s', (name, geometry, teeth, missing) => {
    const found = measureSignal(crankSignal({ ...steady, ...geometry }), 'crank-vr');
    expect(value(found, 'wheel_pattern').value).toBe(name);
    expect(number(found, 'teeth_present')).toBe(teeth);
    expect(number(found, 'teeth_missing')).toBe(missing);
  });

  test('12+1: one tooth added, none missing', () => {
    const teethDeg = [...dividedWheel(12, []), 340].sort((a, b) => a - b);
    const found = measureSignal(
      crankSignal({ ...steady, kind: 'two-level', peak: 5, teethDeg, widthDeg: 6 }),
      'crank-hall',
    );
    expect(value(found, 'wheel_pattern').value).toBe('12+1');
    expect(number(found, 'teeth_present')).toBe(13);
    expect(codes(found)).toContain('rising-edge-without-gap');
  });

  test('24 slots told apart by wide and narrow pulses are 24', () => {
    // Falling edges every 15 degrees, pulses of 3 or 12 degrees; a made-up code, for any code must do.
    const code = '000111010011010111100101';
    const teethDeg = Array.from(code, (bit, k) => k * 15 + (bit === '1' ? 3 : 12));
    const signal = crankSignal({
      ...steady,
      kind: 'two-level',
      peak: 5,
      teethDeg: dividedWheel(24, []),
      widthDeg: 3,
    });
    const high = (deg: number) => {
      const within = ((deg % 360) + 360) % 360;
      const slot = Math.floor(within / 15);
      return within >= teethDeg[slot]!;
    };
    const samples = signal.samples.map((_, i) => (high(signal.angleAt(i * signal.stepS)) ? 5 : 0));
    const found = measureSignal({ ...signal, samples }, 'crank-hall');
    expect(value(found, 'wheel_pattern').value).toBe('24');
    expect(Math.abs(number(found, 'rpm_mean') / 200 - 1)).toBeLessThan(0.02);
  });

  test('evenly spaced teeth are not counted without a cam, and the reason says so', () => {
    const found = measureSignal(crankSignal({ ...steady, ...wheel(36, []) }), 'crank-vr');
    for (const key of ['wheel_pattern', 'rev_count', 'rpm_mean', 'polarity']) {
      expect(value(found, key).value).toBeNull();
      expect(value(found, key).reason).toBeTruthy();
    }
  });
});

describe('cam beside crank', () => {
  // A four-stroke's cam comes round once in 720 crank degrees (arithmetic).
  const camOf = (signal: CrankSignal, lobes: ReadonlyArray<readonly [number, number]>) =>
    signal.samples.map((_, i) => {
      const within = (((signal.angleAt(i * signal.stepS) % 720) + 720) % 720) as number;
      return lobes.some(([rise, fall]) => within >= rise && within < fall) ? 5 : 0;
    });
  const lobes = [
    [40, 100],
    [250, 300],
    [430, 640],
  ] as const;

  test.each(['crank-vr', 'crank-hall'] as const)(
    'counts the teeth of an even wheel without a gap (%s)',
    (circuit) => {
      const geometry = { teethDeg: dividedWheel(36, []), widthDeg: circuit === 'crank-vr' ? 10 : 5 };
      const signal = crankSignal({
        ...steady,
        ...geometry,
        durationS: 2.5,
        kind: circuit === 'crank-vr' ? 'pickup' : 'two-level',
      });
      const axis = { kind: 'even', startS: 0, stepS: signal.stepS, count: signal.samples.length } as const;
      const found = measure(axis, [
        [circuit, signal.samples],
        ['cam-hall', camOf(signal, lobes)],
      ]);
      expect(value(found, 'wheel_pattern').value).toBe('36');
      expect(number(found, 'teeth_present')).toBe(36);
      expect(value(found, 'rpm_mean').value).toBeNull();
      expect(Math.abs(number(found, 'rpm_instant') / 200 - 1)).toBeLessThan(0.06);
    },
  );

  test('gives cam angles within 0.2 degrees, 0 at the mark that the first rising edge follows sooner', () => {
    const signal = crankSignal({ ...steady, durationS: 2.5, dip: 0.2, sampleRateHz: 50_000 });
    const axis = { kind: 'even', startS: 0, stepS: signal.stepS, count: signal.samples.length } as const;
    const found = measure(axis, [
      ['crank-vr', signal.samples],
      ['cam-hall', camOf(signal, lobes)],
    ]);
    const close = (key: string, wanted: readonly number[]) => {
      const got = value(found, key).value as number[];
      expect(got).toHaveLength(wanted.length);
      got.forEach((angle, k) => {
        expect(Math.abs(angle - wanted[k]!)).toBeLessThan(0.2);
      });
    };
    close('cam_rising_angles', [40, 250, 430]);
    close('cam_falling_angles', [100, 300, 640]);
    expect(number(found, 'edges_per_cycle')).toBe(6);
  });
});

describe('gaps and periods', () => {
  // Arithmetic: at 200 rev/min a turn lasts 300 ms; 60-2: 5 ms a tooth, 15 ms the gap; 36-1: 8.333 and 16.667 ms.
  test.each([
    ['60-2', wheel(60, [58, 59]), 5, 15, 3],
    ['36-1', wheel(36, [35]), 300 / 36, 600 / 36, 2],
  ])('%s at 200 rev/min', (_name, geometry, periodMs, gapMs, ratio) => {
    const found = measureSignal(crankSignal({ ...steady, ...geometry, dip: 0 }), 'crank-vr');
    const { teethS, marksS } = found.wheel!;
    const mark = teethS.indexOf(marksS[0]!);
    expect((teethS[mark + 1]! - teethS[mark]!) * 1000).toBeCloseTo(periodMs, 2);
    expect((teethS[mark]! - teethS[mark - 1]!) * 1000).toBeCloseTo(gapMs, 2);
    expect(number(found, 'gap_ratio')).toBeCloseTo(ratio, 2);
    expect(number(found, 'rpm_mean')).toBeCloseTo(200, 2);
  });

  test('every gap passes the two-sided test (ST AN2577 p. 23; Freescale AN2897 p. 20) and no tooth does', () => {
    const k = 1.5;
    const found = measureSignal(crankSignal({ ...steady, dip: 0.3, spinUpS: 0.2, durationS: 2 }), 'crank-vr');
    const { teethS, marksS } = found.wheel!;
    const marks = new Set(marksS);
    for (let i = 2; i + 1 < teethS.length; i += 1) {
      const [before, here, after] = [i - 1, i, i + 1].map((j) => teethS[j]! - teethS[j - 1]!) as [
        number,
        number,
        number,
      ];
      expect(here > k * before && after * k < here).toBe(marks.has(teethS[i]!));
    }
  });

  test('polarity: R = T(i-1)² / (T(i)·T(i-2)) is larger on the right edge (US 11,237,203 B2)', () => {
    for (const inverted of [false, true]) {
      const signal = crankSignal({ ...steady, ...wheel(36, [35]), inverted, noise: 0.02 });
      const right = measureSignal(signal, 'crank-vr');
      expect(value(right, 'polarity').value).toBe(inverted ? 'inverted' : 'normal');
      const pickup = findPickup(signal.samples)!;
      const largestR = (kind: 'falling' | 'rising') => {
        const { at } = placePassages(pickup, kind);
        const interval = (j: number) => at[j]! - at[j - 1]!;
        const all = Array.from(at, (_, j) =>
          j < 2 || j + 1 >= at.length ? 0 : interval(j) ** 2 / (interval(j + 1) * interval(j - 1)),
        );
        return Math.max(...all);
      };
      const [own, other] = inverted ? (['rising', 'falling'] as const) : (['falling', 'rising'] as const);
      expect(largestR(own)).toBeGreaterThan(largestR(other));
    }
  });

  test('tooth events lie at the falling zero crossing, about the local baseline (LM1815 data sheet, SNOSBU8F)', () => {
    const signal = crankSignal({ ...steady, offset: 2.5, drift: 1, sampleRateHz: 50_000 });
    const found = measureSignal(signal, 'crank-vr');
    for (const tooth of found.wheel!.teethS) {
      const nearest = Math.min(...signal.teethS.map((t) => Math.abs(t - tooth)));
      // 0.2 degrees at 200 rev/min.
      expect(nearest).toBeLessThan(0.2 / 1200);
    }
  });

  test('swing of speed: 225 to 85 about a mean of 150 within a turn is measured as such (NASA Tech Briefs 21269)', () => {
    const dip = 1 - 85 / 225;
    const signal = crankSignal({
      ...steady,
      rpm: (225 + 85) / 2,
      dip,
      cylinders: 8,
      durationS: 3,
      sampleRateHz: 50_000,
    });
    const found = measureSignal(signal, 'crank-vr', 8);
    expect(value(found, 'wheel_pattern').value).toBe('60-2');
    const instant = value(found, 'rpm_instant');
    expect(Math.abs((instant.min as number) - 85)).toBeLessThan(4);
    expect(Math.abs((instant.max as number) - 225)).toBeLessThan(4);
  });
});
