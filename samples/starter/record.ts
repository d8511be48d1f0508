import { type Column, type Dialect, toCsv } from '../csv.ts';
import { type CoilFiring, coilAmperes, coilVolts } from '../physics/coil.ts';
import { crankMotion } from '../physics/crank-motion.ts';
import { injectorVolts } from '../physics/injector.ts';
import { pickUpVolts } from '../physics/pick-up.ts';
import { seededNormal, seededUniform } from '../physics/random.ts';
import { starterAmperes } from '../physics/starter.ts';
import { toothStretches, twoLevels } from '../physics/two-levels.ts';
import type { StarterEngine } from './engines.ts';
import type { StarterFault } from './faults.ts';

export interface Recording {
  readonly startS: number;
  readonly stepS: number;
  readonly columns: readonly Column[];
}

export interface RecordOptions {
  readonly seed: number;
  readonly fault?: StarterFault;
  /** Instead of the engine's cranking speed. */
  readonly rpm?: number;
  /** Noise as a multiple of the usual. */
  readonly noise?: number;
  /** Tooth that is chipped, 1 the first after the gap. */
  readonly tooth?: number;
}

const DIALECTS: readonly Dialect[] = [
  { delimiter: ',', decimal: '.', timeUnit: 's' },
  { delimiter: ';', decimal: ',', timeUnit: 'ms' },
  { delimiter: '\t', decimal: '.', timeUnit: 'us' },
];

/** A recording as a scope would export it; the seed also chooses the dialect. */
export const csvOf = ({ startS, stepS, columns }: Recording, seed: number): string =>
  toCsv(startS, stepS, columns, DIALECTS[seed % DIALECTS.length]!);

/** Numbers that differ from vehicle to vehicle, seeded. */
function vehicle({ seed, noise = 1 }: RecordOptions) {
  const uniform = seededUniform(seed * 7919 + 17);
  const normal = seededNormal(seed * 104_729 + 5);
  return {
    uniform,
    /** 1 within a part either way. */
    about: (part: number) => 1 + part * (2 * uniform() - 1),
    noisy: (values: Float64Array, rms: number) => values.map((value) => value + noise * rms * normal()),
  };
}

const sampled = (startS: number, stepS: number, count: number, at: (timeS: number) => number) =>
  Float64Array.from({ length: count }, (_, i) => at(startS + i * stepS));

/** How fast it cranks with a fault: without compression fast, on a low battery slowly. */
function speedOf(
  engine: StarterEngine,
  { fault, rpm }: RecordOptions,
  about: (part: number) => number,
): number {
  const usual = rpm ?? engine.crankingRpm * about(0.06);
  return fault === 'no compression' ? usual * 1.35 : fault === 'low supply' ? usual * 0.58 : usual;
}

const lateDegOf = (engine: StarterEngine, fault: StarterFault | undefined): number =>
  (360 / engine.sprocketTeeth) *
  (fault === 'belt slipped one tooth' ? 1 : fault === 'belt slipped two teeth' ? 2 : 0);

/** Crank and cam while cranking, four turns and a bit, so that one whole cycle of the cam is in it wherever it begins. */
export function crankAndCam(engine: StarterEngine, options: RecordOptions): Recording {
  const { about, noisy, uniform } = vehicle(options);
  const { fault } = options;
  const rpm = speedOf(engine, options, about);
  const stepS = rpm > 400 ? 2e-5 : 5e-5;
  const count = Math.ceil((4.4 * 60) / rpm / stepS);
  const dip = fault === 'no compression' ? 0.004 : 0.045 * about(0.2);
  const motion = { rpm, cylinders: engine.cylinders, dip, startDeg: 360 * uniform() };
  const { angleDeg, speedDegS } = crankMotion(motion, stepS, count);
  const crank = crankColumn(engine, options, about, { angleDeg, speedDegS, stepS });
  const play = 0.5 * (2 * uniform() - 1) + lateDegOf(engine, fault);
  const high = engine.camHighDeg.map(([from, to]) => [(from + play) % 720, (to + play) % 720] as const);
  const cam = twoLevels(high, 720, angleDeg, stepS, { low: 0.15, high: 4.9 * about(0.01), riseS: 1.5e-5 });
  return {
    startS: 0,
    stepS,
    columns: [
      {
        name: 'Crank',
        unit: 'V',
        values: noisy(crank, engine.sensor === 'two-wire' ? 0.02 * engine.peakV : 0.015),
      },
      { name: 'Cam', unit: 'V', values: noisy(cam, 0.015) },
    ],
  };
}

function crankColumn(
  engine: StarterEngine,
  { fault, tooth }: RecordOptions,
  about: (part: number) => number,
  motion: { angleDeg: Float64Array; speedDegS: Float64Array; stepS: number },
): Float64Array {
  const { places, missing } = engine.wheel;
  if (engine.sensor === 'three-wire') {
    const levels = { low: 0.12, high: 4.92 * about(0.01), riseS: 1.5e-5 };
    const teeth = toothStretches(places, missing, 0.5 * about(0.04));
    return twoLevels(teeth, 360, motion.angleDeg, motion.stepS, levels);
  }
  const weak = fault === 'chipped tooth' ? { [tooth ?? Math.round(places * 0.4)]: 0.33 } : {};
  const runOut = fault === 'bent wheel' ? 0.33 * about(0.1) : 0.03 * about(0.5);
  const peakV =
    engine.peakV *
    about(0.08) *
    (fault === 'wide air gap' ? 0.35 : 1) *
    (fault === 'reversed wires' ? -1 : 1);
  return pickUpVolts({ places, missing, runOut, weak }, motion.angleDeg, motion.speedDegS, peakV);
}

/** The switched side and the current of one coil, two firings. */
export function coil(engine: StarterEngine, options: RecordOptions): Recording {
  const { about, noisy } = vehicle(options);
  const { fault } = options;
  const own = engine.coil;
  const intervalS = 60 / speedOf(engine, options, about);
  const burns = fault !== 'open secondary';
  const shorted = fault === 'shorted turns';
  const weak = fault === 'weak driver';
  const given: CoilFiring = {
    supplyV: 11.7 * about(0.03) * (fault === 'low supply' ? 0.68 : 1),
    firingsS: [0.03, 0.03 + intervalS],
    dwellS: own.dwellS * about(0.04),
    henry: own.henry * about(0.02) * (shorted ? 0.55 : 1),
    ohm: own.ohm * about(0.02),
    kickV: burns ? own.kickV * about(0.05) * (shorted ? 0.45 : weak ? 0.6 : 1) : own.clampV,
    burnS: burns ? own.burnS * about(0.06) * (shorted ? 0.6 : weak ? 0.7 : 1) : null,
    burnV: own.burnV * about(0.05),
    ...(shorted ? { stepA: 4.5 * about(0.1) } : {}),
    ...(weak ? { onDropV: 5.2 * about(0.05) } : {}),
  };
  const stepS = 1e-5;
  const count = Math.ceil((intervalS + 0.05) / stepS);
  return {
    startS: 0,
    stepS,
    columns: [
      {
        name: 'Coil',
        unit: 'V',
        values: noisy(
          sampled(0, stepS, count, (t) => coilVolts(given, t)),
          0.12,
        ),
      },
      {
        name: 'Coil current',
        unit: 'A',
        values: noisy(
          sampled(0, stepS, count, (t) => coilAmperes(given, t)),
          0.03,
        ),
      },
    ],
  };
}

/** One injector, three pulses. */
export function injector(engine: StarterEngine, options: RecordOptions): Recording {
  const { about, noisy } = vehicle(options);
  const { fault } = options;
  const given = {
    supplyV: 11.8 * about(0.03) * (fault === 'low supply' ? 0.68 : 1),
    startsS: [0.02, 0.12, 0.22],
    widthS: engine.injector.widthS * about(0.05),
    clampV: engine.injector.clampV * about(0.02),
    humpV: fault === 'injector without hump' ? 0 : engine.injector.humpV * about(0.08),
  };
  const stepS = 2e-5;
  const count = 15_000;
  const values = noisy(
    sampled(0, stepS, count, (t) => injectorVolts(given, t)),
    0.1,
  );
  return { startS: 0, stepS, columns: [{ name: 'Injector', unit: 'V', values }] };
}

/** Starter current and supply from rest on, two and a half seconds. */
export function starter(engine: StarterEngine, options: RecordOptions): Recording {
  const { about, noisy, uniform } = vehicle(options);
  const { fault } = options;
  const stepS = 5e-4;
  const count = 5200;
  const onS = 0.2;
  const rpm = speedOf(engine, options, about);
  const dip = fault === 'no compression' ? 0.005 : 0.1;
  const motion = { rpm, cylinders: engine.cylinders, dip, startDeg: -6 * rpm * onS - 90 * uniform() };
  const { angleDeg } = crankMotion(motion, stepS, count);
  const own = engine.starter;
  const low = fault === 'low supply';
  const hump = own.humpA * about(0.04) * (fault === 'no compression' ? 0.04 : 1);
  const humpA = Array.from({ length: engine.cylinders }, (_, i) =>
    fault === 'one weak cylinder' && i === 1 ? hump * 0.45 : hump * about(0.02),
  );
  const meanA = own.meanA * about(0.04) * (fault === 'no compression' ? 0.7 : 1);
  const inrushA = own.inrushA * about(0.04);
  const amperes = sampled(0, stepS, count, (t) =>
    starterAmperes(t, angleDeg[Math.round(t / stepS)] ?? 0, { onS, inrushA, meanA, humpA }),
  );
  const restV = 12.5 * about(0.01) - (low ? 0.7 : 0);
  // Battery and cables as one resistance: U = U0 - R i.
  const ohm = (low ? 0.0135 : 0.0062) * about(0.05);
  const volts = amperes.map((value) => restV - ohm * value);
  return {
    startS: 0,
    stepS,
    columns: [
      { name: 'Starter', unit: 'A', values: noisy(amperes, 1.2) },
      { name: 'Battery', unit: 'V', values: noisy(volts, 0.02) },
    ],
  };
}

export const RECORDERS = { 'crank and cam': crankAndCam, coil, injector, starter } as const;
export type RecordingKind = keyof typeof RECORDERS;
