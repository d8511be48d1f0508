import { type Column, type Dialect, toCsv } from './csv.ts';
import { ELECTRICAL } from './electrical.ts';
import { type CoilFiring, coilAmperes, coilVolts } from './physics/coil.ts';
import { type CrankMotion, crankMotion } from './physics/crank-motion.ts';
import { injectorVolts } from './physics/injector.ts';
import { pickUpVolts, type ToothWheel } from './physics/pick-up.ts';
import { starterAmperes } from './physics/starter.ts';
import { toothStretches, twoLevels } from './physics/two-levels.ts';
import { comma, continental, noisy, type Sample, sampled, tabbed } from './sample.ts';

const camLobes = [
  [57, 137],
  [297, 369],
  [537, 669],
] as const;

interface CrankCase {
  readonly wheel: ToothWheel;
  readonly motion: CrankMotion;
  readonly reversed?: boolean;
  readonly cam?: { readonly lateDeg: number };
  readonly seed: number;
  readonly dialect: Dialect;
  readonly name: string;
}

function crankCsv(given: CrankCase): string {
  const stepS = 4e-5;
  const count = 27_500;
  const { angleDeg, speedDegS } = crankMotion(given.motion, stepS, count);
  const volts = pickUpVolts(given.wheel, angleDeg, speedDegS, given.reversed ? -1.1 : 1.1);
  const columns: Column[] = [{ name: given.name, unit: 'V', values: noisy(volts, 0.02, given.seed) }];
  if (given.cam) {
    const late = given.cam.lateDeg;
    const lobes = camLobes.map(([from, to]) => [(from + late) % 720, (to + late) % 720] as const);
    const levels = twoLevels(lobes, 720, angleDeg, stepS, { low: 0.15, high: 4.9, riseS: 1.5e-5 });
    columns.push({ name: 'Cam', unit: 'V', values: noisy(levels, 0.015, given.seed + 1) });
  }
  return toCsv(0, stepS, columns, given.dialect);
}

function hallCsv(): string {
  const stepS = 4e-5;
  const motion = { rpm: 191, cylinders: 4, dip: 0.05, startDeg: 140 };
  const { angleDeg } = crankMotion(motion, stepS, 27_500);
  const levels = { low: 0.12, high: 4.92, riseS: 1.5e-5 };
  const volts = twoLevels(toothStretches(36, 2, 0.5), 360, angleDeg, stepS, levels);
  const preamble = ['Simulated recording', 'Date: 2026-05-06', ''];
  return toCsv(0, stepS, [{ name: 'Crank', unit: 'V', values: noisy(volts, 0.015, 41) }], {
    ...comma,
    preamble,
  });
}

const coil: CoilFiring = {
  supplyV: 11.6,
  firingsS: [0.031, 0.181, 0.331],
  dwellS: 0.0042,
  henry: 0.0034,
  ohm: 0.62,
  kickV: 262,
  burnS: 0.0013,
  burnV: 33,
};

function coilVoltsCsv(given: CoilFiring, seed: number): string {
  const stepS = 5e-6;
  const values = sampled(0, stepS, 72_000, (t) => coilVolts(given, t));
  return toCsv(0, stepS, [{ name: 'Coil 1', unit: 'V', values: noisy(values, 0.12, seed) }], comma);
}

function coilAmperesCsv(): string {
  const stepS = 1e-5;
  const values = sampled(0, stepS, 36_000, (t) => coilAmperes(coil, t));
  return toCsv(0, stepS, [{ name: 'Coil 1', unit: 'A', values: noisy(values, 0.03, 61) }], continental);
}

function injectorCsv(): string {
  const stepS = 2e-5;
  const injector = { supplyV: 11.8, startsS: [0.02, 0.17, 0.32], widthS: 0.0096, clampV: 64, humpV: 1.4 };
  const values = sampled(-0.05, stepS, 22_000, (t) => injectorVolts(injector, t));
  return toCsv(-0.05, stepS, [{ name: 'Injector 2', unit: 'V', values: noisy(values, 0.1, 71) }], comma);
}

function starterCsv(humpA: readonly number[], seed: number): string {
  const stepS = 1e-4;
  const onS = 0.2;
  const { angleDeg } = crankMotion({ rpm: 197, cylinders: 4, dip: 0.1, startDeg: -236 }, stepS, 26_000);
  const values = sampled(0, stepS, 26_000, (t) => {
    const angle = angleDeg[Math.round(t / stepS)] ?? 0;
    return starterAmperes(t, angle, { onS, inrushA: 520, meanA: 105, humpA });
  });
  return toCsv(0, stepS, [{ name: 'Starter', unit: 'A', values: noisy(values, 1.2, seed) }], continental);
}

const cranking: CrankMotion = { rpm: 208, cylinders: 4, dip: 0.04, startDeg: 150 };
const sixty: ToothWheel = { places: 60, missing: 2, runOut: 0.03 };

/** Every sample, in the order a beginner would open them. */
export const SAMPLES: readonly Sample[] = [
  {
    file: 'crank-60-2-with-cam.csv',
    title: 'Crank and cam while cranking',
    text: 'Simulated. A regular 60-2 wheel at about 208 rpm with a three-lobe cam: what a good pair looks like.',
    cylinders: 4,
    csv: () =>
      crankCsv({
        wheel: sixty,
        motion: cranking,
        cam: { lateDeg: 0 },
        seed: 11,
        dialect: tabbed,
        name: 'Crank',
      }),
  },
  {
    file: 'crank-60-2-cam-late.csv',
    title: 'Cam 18 degrees late',
    text: 'Simulated. The same engine with the belt one tooth off at a crank sprocket of 20 teeth. Compare it with the good pair.',
    cylinders: 4,
    csv: () =>
      crankCsv({
        wheel: sixty,
        motion: { ...cranking, rpm: 201, startDeg: 40 },
        cam: { lateDeg: 18 },
        seed: 13,
        dialect: tabbed,
        name: 'Crank',
      }),
  },
  {
    file: 'crank-36-1-reversed.csv',
    title: 'Pick-up with its wires swapped',
    text: 'Simulated. A 36-1 wheel whose swings are turned over: the sensor or the probe leads are the other way round.',
    cylinders: 4,
    csv: () =>
      crankCsv({
        wheel: { places: 36, missing: 1, runOut: 0.05 },
        motion: { ...cranking, rpm: 182, startDeg: 210 },
        reversed: true,
        seed: 17,
        dialect: continental,
        name: 'KW',
      }),
  },
  {
    file: 'crank-60-2-weak-tooth.csv',
    title: 'One short tooth',
    text: 'Simulated. Tooth 23 passes with a third of the flux, every turn: a chip, or iron dust beside it.',
    cylinders: 4,
    csv: () =>
      crankCsv({
        wheel: { ...sixty, weak: { 23: 0.33 } },
        motion: { ...cranking, rpm: 215, startDeg: 300 },
        seed: 19,
        dialect: comma,
        name: 'Crank',
      }),
  },
  {
    file: 'crank-36-2-three-wire.csv',
    title: 'Three-wire crank sensor',
    text: 'Simulated. Two clean levels from a 36-2 wheel.',
    cylinders: 4,
    csv: hallCsv,
  },
  {
    file: 'coil-primary-burn.csv',
    title: 'Coil primary with a burn line',
    text: 'Simulated. Three firings: dwell, kick, burn, ring.',
    cylinders: 4,
    csv: () => coilVoltsCsv(coil, 51),
  },
  {
    file: 'coil-primary-no-burn.csv',
    title: 'Coil primary without a burn line',
    text: 'Simulated. The kick stops flat at the driver’s clamp and rings out: the gap did not break down.',
    cylinders: 4,
    csv: () => coilVoltsCsv({ ...coil, kickV: 362, burnS: null }, 53),
  },
  {
    file: 'coil-primary-amperes.csv',
    title: 'Coil primary current',
    text: 'Simulated. The curve of a sound coil charging to about nine amperes.',
    cylinders: 4,
    csv: coilAmperesCsv,
  },
  {
    file: 'injector-pulses.csv',
    title: 'Injector pulses',
    text: 'Simulated. Three pulses with the needle’s hump after each spike.',
    cylinders: 4,
    csv: injectorCsv,
  },
  {
    file: 'starter-weak-cylinder.csv',
    title: 'Starter current, one weak compression',
    text: 'Simulated. Every fourth hump is lower than its neighbours.',
    cylinders: 4,
    csv: () => starterCsv([62, 62, 30, 62], 81),
  },
  ...ELECTRICAL,
];
