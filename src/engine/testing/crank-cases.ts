import type { CaptureFindings } from '../capture.ts';
import { measureCapture } from '../measure.ts';
import type { Value } from '../value.ts';
import {
  type CrankSignal,
  type CrankSignalOptions,
  crankSignal,
  dividedWheel,
  steady,
} from './crank-signal.ts';
import { random } from './random.ts';

/** Wheels × sensors × hardships, for sweeps that count what is answered right, not at all, short or wrong. */
interface TestWheel {
  /** The name that is right; null where a capture of the crank alone cannot show a turn. */
  readonly name: string | null;
  readonly teethDeg: readonly number[];
  /** Degrees from place to place. */
  readonly pitchDeg: number;
  /** Angles that may serve as the reference mark; only 0 unless given. */
  readonly marksDeg?: readonly number[];
}

const divided = (name: string | null, places: number, missing: readonly number[]): TestWheel => ({
  name,
  teethDeg: dividedWheel(places, missing),
  pitchDeg: 360 / places,
});

export const SWEPT_WHEELS: Readonly<Record<string, TestWheel>> = {
  '60-2': divided('60-2', 60, [58, 59]),
  '36-1': divided('36-1', 36, [35]),
  '36-2': divided('36-2', 36, [34, 35]),
  '36-2-2-2': { ...divided('36-2-2-2', 36, [1, 2, 16, 17, 34, 35]), marksDeg: [30] },
  '36-2-1': { ...divided('36-2-1', 36, [18, 34, 35]), marksDeg: [0, 190] },
  '12-1': divided('12-1', 12, [11]),
  '4-1': divided('4-1', 4, [3]),
  '24-1': divided('24-1', 24, [23]),
  '24-2': divided('24-2', 24, [22, 23]),
  '32-2': divided('32-2', 32, [30, 31]),
  '48-3': divided('48-3', 48, [45, 46, 47]),
  '30-1': divided('30-1', 30, [29]),
  '3-1': divided('3-1', 3, [2]),
  '12+1': {
    name: '12+1',
    teethDeg: [...dividedWheel(12, []), 340].sort((a, b) => a - b),
    pitchDeg: 30,
    marksDeg: [0, 340],
  },
  '4': divided(null, 4, []),
  '8': divided(null, 8, []),
  '36': divided(null, 36, []),
};

type Options = Partial<CrankSignalOptions>;
interface Hardship {
  /** Options of the signal; `turnS` is the time of a turn at speed. */
  readonly of: (pick: (low: number, high: number) => number, turnS: number, pitchDeg: number) => Options;
  /** Only every so-manieth case is of use for two-level signals. */
  readonly pickupOnly?: boolean;
}

const all = { noise: 0.2, hum: 0.2, bits: 8, dip: 0.3, runOut: 0.35, spikes: 10 } as const;

export const HARDSHIPS: Readonly<Record<string, Hardship>> = {
  clean: { of: () => ({}) },
  noise: { of: () => ({ noise: 0.2 }) },
  'hum 50': { of: () => ({ hum: 0.2 }) },
  'hum 60': { of: () => ({ hum: 0.2, humHz: 60 }) },
  'noise and hum': { of: () => ({ noise: 0.2, hum: 0.2 }) },
  'eight bits': { of: () => ({ bits: 8 }) },
  dips: { of: () => ({ dip: 0.3 }) },
  'run-out': { of: () => ({ runOut: 0.35 }), pickupOnly: true },
  'run-out and dips': { of: () => ({ runOut: 0.35, dip: 0.3 }), pickupOnly: true },
  'spin-up': { of: (pick) => ({ spinUpS: pick(0.1, 0.4), dip: 0.15 }) },
  'weak tooth': {
    of: (pick) => ({ weak: { tooth: Math.round(pick(2, 3)), height: 0.5 } }),
    pickupOnly: true,
  },
  spikes: { of: () => ({ spikes: 15 }) },
  clipping: { of: () => ({ clip: 1 }), pickupOnly: true },
  drift: { of: () => ({ drift: 2, offset: 2.5 }), pickupOnly: true },
  'turn and a half': { of: (_, turnS) => ({ durationS: 1.5 * turnS }) },
  'less than a turn': { of: (pick, turnS) => ({ durationS: pick(0.5, 0.98) * turnS }) },
  stall: { of: (pick) => ({ stallS: pick(1, 1.4) }) },
  undersampled: {
    of: (pick, turnS, pitchDeg) => ({ sampleRateHz: (360 / pitchDeg / turnS) * pick(2.2, 7) }),
  },
  'all at once': { of: () => all },
  'all and spin-up': { of: (pick) => ({ ...all, spinUpS: pick(0.1, 0.4) }) },
};

export const SENSORS = ['crank-vr', 'crank-hall'] as const;

export interface SweptCase {
  readonly wheel: string;
  readonly sensor: (typeof SENSORS)[number];
  readonly hardship: string;
  readonly seed: number;
}

export interface Verdict {
  readonly outcome: 'right' | 'short' | 'silent' | 'wrong';
  readonly why: string;
}

export function sweptSignal({ wheel, sensor, hardship, seed }: SweptCase): CrankSignal {
  const { teethDeg, pitchDeg } = SWEPT_WHEELS[wheel]!;
  const rng = random(seed * 7919 + wheel.length * 131 + hardship.length * 17 + teethDeg.length);
  const rpm = rng.between(130, 300);
  const rates = [10_000, 20_000, 50_000];
  const pick = (low: number, high: number) => rng.between(low, high);
  const shape = seed % 3 === 2 ? 'bell' : 'sine';
  const share = wheel === '12+1' ? 0.3 : shape === 'bell' ? pick(0.9, 1) : seed % 2 === 0 ? 1 : pick(0.5, 1);
  return crankSignal({
    ...steady,
    seed,
    rpm,
    teethDeg,
    shape,
    widthDeg:
      pitchDeg * (sensor === 'crank-hall' ? (wheel === '12+1' ? pick(0.15, 0.28) : pick(0.3, 0.7)) : share),
    kind: sensor === 'crank-hall' ? 'two-level' : 'pickup',
    peak: sensor === 'crank-hall' ? 5 : 2,
    startDeg: -pick(10, 350),
    cylinders: [3, 4, 6, 8][Math.floor(pick(0, 4))]!,
    inverted: sensor === 'crank-vr' && seed % 4 >= 2,
    sampleRateHz: rates[seed % 3]!,
    durationS: hardship === 'spin-up' || hardship === 'all and spin-up' ? 2.5 : pick(4.3, 8) * (60 / rpm),
    ...HARDSHIPS[hardship]!.of(pick, 60 / rpm, pitchDeg),
  });
}

export function measureSwept(swept: SweptCase, signal: CrankSignal): CaptureFindings {
  return measureCapture({
    axis: { kind: 'even', startS: 0, stepS: signal.stepS, count: signal.samples.length },
    cylinders: null,
    signals: [
      {
        index: 0,
        name: 'crank',
        circuit: swept.sensor,
        unit: 'V',
        factor: 1,
        offset: 0,
        samples: signal.samples,
      },
    ],
  });
}

/**
 * Wrong: any number that is not what the geometry says. Short: right as far as it goes, but a turn that is there was
 * not counted. Silent: null with a reason.
 */
export function judged(swept: SweptCase, signal: CrankSignal, found: CaptureFindings): Verdict {
  const wheel = SWEPT_WHEELS[swept.wheel]!;
  const values = new Map(found.signals[0]!.values.map((value) => [value.key, value]));
  const of = (key: string): Value => values.get(key)!;
  const name = of('wheel_pattern').value;
  const polarity = values.get('polarity')?.value ?? null;
  if (swept.sensor === 'crank-vr' && polarity !== null && wheel.name !== null) {
    const isInverted = swept.seed % 4 >= 2;
    if (polarity !== (isInverted ? 'inverted' : 'normal')) return wrong(`polarity ${polarity}`);
  }
  if (name === null) {
    // With fewer than two gaps, or two teeth a turn, silence is what is right.
    const unknowable = wheel.name === null || wheel.teethDeg.length < 3 || signal.marksS.length < 2;
    return { outcome: unknowable ? 'right' : 'silent', why: of('wheel_pattern').reason! };
  }
  if (name !== wheel.name) return wrong(`pattern ${name}`);
  if (of('teeth_present').value !== wheel.teethDeg.length) return wrong(`teeth ${of('teeth_present').value}`);

  const irregular = of('irregular_teeth').value;
  if (Array.isArray(irregular) && irregular.length > 0 && swept.hardship !== 'weak tooth') {
    return wrong(`irregular ${JSON.stringify(irregular)}`);
  }
  const marks = found.wheel?.marksS ?? [];
  const allowed = wheel.marksDeg ?? [0];
  const distance = (angle: number, mark: number) =>
    Math.abs(angle - mark - 360 * Math.round((angle - mark) / 360));
  const angles = marks.map((mark) => signal.angleAt(mark));
  const chosen = allowed.find((mark) =>
    angles.every((angle) => distance(angle, mark) < 0.75 * wheel.pitchDeg),
  );
  if (chosen === undefined)
    return wrong(`marks at ${angles.map((angle) => (angle % 360).toFixed(0)).join(' ')} degrees`);
  const count = of('rev_count').value;
  if (typeof count !== 'number') return { outcome: 'silent', why: of('rev_count').reason! };
  const truth =
    signal.teethS.slice(1).filter((tooth) => distance(signal.angleAt(tooth), chosen) < 0.25 * wheel.pitchDeg)
      .length - 1;
  if (count > truth) return wrong(`${count} turns of ${truth}`);
  const speed = of('rpm_mean');
  if (typeof speed.value === 'number') {
    let turned = 0;
    let time = 0;
    for (const { from, to } of speed.evidence) {
      turned += (signal.angleAt(to) - signal.angleAt(from)) / 360;
      time += to - from;
    }
    if (speed.evidence.length < 50) {
      if (Math.abs(turned - count) > 0.25) return wrong(`${count} turns where ${turned.toFixed(2)} passed`);
      if (Math.abs(speed.value / ((60 * turned) / time) - 1) > 0.005 + signal.stepS / time) {
        return wrong(`rpm ${speed.value.toFixed(2)} for ${((60 * turned) / time).toFixed(2)}`);
      }
    }
  }
  if (count < truth) return { outcome: 'short', why: `${count} turns of ${truth}` };
  return { outcome: 'right', why: '' };
}

const wrong = (why: string): Verdict => ({ outcome: 'wrong', why });
