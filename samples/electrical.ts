import { toCsv } from './csv.ts';
import { type CoilFiring, coilAmperes } from './physics/coil.ts';
import { crankMotion } from './physics/crank-motion.ts';
import { pumpAmperes } from './physics/fuel-pump.ts';
import { injectorVolts } from './physics/injector.ts';
import { injectorAmperes } from './physics/injector-current.ts';
import { pickUpVolts } from './physics/pick-up.ts';
import { starterAmperes } from './physics/starter.ts';
import { toothStretches, twoLevels } from './physics/two-levels.ts';
import { comma, continental, noisy, type Sample, sampled, tabbed } from './sample.ts';

/** Starter current with the battery's voltage: what the cells' and cables' resistance takes off while it flows. */
function crankingCsv(restV: number, ohm: number, inrushA: number, seed: number): string {
  const stepS = 2e-4;
  const { angleDeg } = crankMotion({ rpm: 190, cylinders: 4, dip: 0.1, startDeg: -236 }, stepS, 13_000);
  const humpA = [60, 60, 60, 60];
  const amperes = sampled(0, stepS, 13_000, (t) =>
    starterAmperes(t, angleDeg[Math.round(t / stepS)] ?? 0, { onS: 0.3, inrushA, meanA: 110, humpA }),
  );
  const volts = amperes.map((one) => restV - ohm * one);
  const columns = [
    { name: 'Starter', unit: 'A', values: noisy(amperes, 1.5, seed) },
    { name: 'Battery', unit: 'V', values: noisy(volts, 0.02, seed + 1) },
  ];
  return toCsv(0, stepS, columns, continental);
}

/** Command to a coil with its own driver, and the current that follows. */
function commandCsv(firingsS: readonly number[], ohm: number, seed: number): string {
  const stepS = 2.5e-5;
  const coil: CoilFiring = {
    supplyV: 11.7,
    firingsS,
    dwellS: 0.0036,
    henry: 0.0032,
    ohm,
    kickV: 0,
    burnS: null,
    burnV: 0,
  };
  const on = (t: number) => firingsS.some((off) => t >= off - coil.dwellS && t < off);
  const columns = [
    {
      name: 'Coil command',
      unit: 'V',
      values: noisy(
        sampled(0, stepS, 20_000, (t) => (on(t) ? 4.85 : 0.12)),
        0.02,
        seed,
      ),
    },
    {
      name: 'Coil current',
      unit: 'A',
      values: noisy(
        sampled(0, stepS, 20_000, (t) => coilAmperes(coil, t)),
        0.03,
        seed + 1,
      ),
    },
  ];
  return toCsv(0, stepS, columns, comma);
}

function injectorPairCsv(moves: boolean, seed: number): string {
  const stepS = 2.5e-5;
  const startsS = [0.03, 0.2, 0.37];
  const widthS = 0.0088;
  const volts = sampled(0, stepS, 18_000, (t) =>
    injectorVolts({ supplyV: 11.9, startsS, widthS, clampV: 62, humpV: moves ? 1.5 : 0 }, t),
  );
  const amperes = sampled(0, stepS, 18_000, (t) =>
    injectorAmperes(t, { startsS, widthS, supplyV: 11.6, ohm: 13.8, henry: 0.024, dentA: moves ? 0.05 : 0 }),
  );
  const columns = [
    { name: 'Injector 3', unit: 'V', values: noisy(volts, 0.06, seed) },
    { name: 'Injector 3 current', unit: 'A', values: noisy(amperes, 0.003, seed + 1) },
  ];
  return toCsv(0, stepS, columns, comma);
}

function pumpCsv(rpm: number, meanA: number, bars: readonly number[], seed: number): string {
  const stepS = 4e-5;
  const values = sampled(0, stepS, 10_000, (t) => pumpAmperes(t, { meanA, rippleA: 0.9, rpm, bars }));
  return toCsv(0, stepS, [{ name: 'Fuel pump', unit: 'A', values: noisy(values, 0.03, seed) }], comma);
}

/** Cam pick-up: three lobes on a wheel with four places, at half the crank's speed. */
function camPickUpCsv(voltsAt200: number, humV: number, seed: number): string {
  const stepS = 1e-4;
  const { angleDeg, speedDegS } = crankMotion(
    { rpm: 205, cylinders: 4, dip: 0.04, startDeg: 60 },
    stepS,
    20_000,
  );
  const cam = pickUpVolts(
    { places: 4, missing: 1 },
    angleDeg.map((one) => one / 2),
    speedDegS.map((one) => one / 2),
    2 * voltsAt200,
  );
  const hummed = cam.map((one, i) => one + humV * Math.sin(2 * Math.PI * 50 * i * stepS));
  return toCsv(0, stepS, [{ name: 'Cam', unit: 'V', values: noisy(hummed, 0.01, seed) }], tabbed);
}

function badGroundCsv(): string {
  const stepS = 4e-5;
  const { angleDeg } = crankMotion({ rpm: 188, cylinders: 4, dip: 0.05, startDeg: 95 }, stepS, 27_500);
  const volts = twoLevels(toothStretches(36, 2, 0.5), 360, angleDeg, stepS, {
    low: 1.9,
    high: 4.9,
    riseS: 1.5e-5,
  });
  return toCsv(0, stepS, [{ name: 'Crank', unit: 'V', values: noisy(volts, 0.015, 43) }], comma);
}

/** Fuel rail pressure: the pump builds it up, then it holds, or leaks away. */
function pressureCsv(leakS: number, seed: number): string {
  const stepS = 1e-3;
  const values = sampled(0, stepS, 8_000, (t) => {
    if (t < 0.5) return 12;
    const built = 345 * -Math.expm1(-(Math.min(t, 2.5) - 0.5) / 0.25);
    return 12 + (t < 2.5 ? built : built * Math.exp(-(t - 2.5) / leakS));
  });
  return toCsv(
    0,
    stepS,
    [{ name: 'Rail pressure', unit: 'kPa', values: noisy(values, 1.2, seed) }],
    continental,
  );
}

const bars = [1, 0.94, 0.98, 0.9, 1, 0.96, 0.92, 0.97];
const firings = [0.04, 0.115, 0.19, 0.265, 0.34, 0.415, 0.49];

/** Command, currents, supply and pressure: a good and a faulty one of each. */
export const ELECTRICAL: readonly Sample[] = [
  {
    file: 'crank-36-2-high-low-level.csv',
    title: 'Three-wire crank sensor that does not reach ground',
    text: 'Simulated. The low level stays near 1.9 V: resistance in the sensor’s ground. Compare it with the sound three-wire sensor.',
    cylinders: 4,
    csv: badGroundCsv,
  },
  {
    file: 'cam-pick-up.csv',
    title: 'Two-wire cam sensor',
    text: 'Simulated. Three clear swings in two turns of the crank, with the long gap between the third and the first.',
    cylinders: 4,
    csv: () => camPickUpCsv(0.8, 0, 91),
  },
  {
    file: 'cam-pick-up-weak.csv',
    title: 'Two-wire cam sensor, weak',
    text: 'Simulated. The same swings at an eighth of the height with mains hum on them: a wide air gap, dust on the sensor or a poor screen.',
    cylinders: 4,
    csv: () => camPickUpCsv(0.1, 0.015, 93),
  },
  {
    file: 'coil-command.csv',
    title: 'Coil command and current',
    text: 'Simulated. Even command pulses, and the coil’s current rising under each to about nine amperes.',
    cylinders: 4,
    csv: () => commandCsv(firings, 0.62, 101),
  },
  {
    file: 'coil-command-missing-pulses.csv',
    title: 'Coil command with pulses missing',
    text: 'Simulated. Two commands do not come: look at the crank signal at that moment before the coil.',
    cylinders: 4,
    csv: () =>
      commandCsv(
        firings.filter((_, k) => k !== 2 && k !== 3),
        0.62,
        103,
      ),
  },
  {
    file: 'coil-current-low.csv',
    title: 'Coil current low and flat',
    text: 'Simulated. The current stops early near three amperes: high resistance in feed, ground, connector or winding.',
    cylinders: 4,
    csv: () => commandCsv(firings, 3.6, 105),
  },
  {
    file: 'injector-volts-amperes.csv',
    title: 'Injector voltage and current',
    text: 'Simulated. The needle’s dent in the rising current, and its hump after the spike: the needle moves.',
    cylinders: 4,
    csv: () => injectorPairCsv(true, 111),
  },
  {
    file: 'injector-stuck-needle.csv',
    title: 'Injector whose needle does not move',
    text: 'Simulated. Pulse, spike and current are there, dent and hump are not: electrically sound, mechanically stuck.',
    cylinders: 4,
    csv: () => injectorPairCsv(false, 113),
  },
  {
    file: 'cranking-good.csv',
    title: 'Starter current and battery voltage',
    text: 'Simulated. Inrush, even compressions and a plateau above ten volts.',
    cylinders: 4,
    csv: () => crankingCsv(12.6, 0.0098, 500, 121),
  },
  {
    file: 'cranking-weak-battery.csv',
    title: 'Battery voltage that collapses',
    text: 'Simulated. The inrush pulls the supply below seven volts: a control unit may reset. Battery, cables or starter.',
    cylinders: 4,
    csv: () => crankingCsv(11.9, 0.0165, 420, 123),
  },
  {
    file: 'fuel-pump.csv',
    title: 'Fuel pump current',
    text: 'Simulated. Eight alike ripples a turn at some 5,500 rev/min.',
    cylinders: 4,
    csv: () => pumpCsv(5500, 5.2, bars, 131),
  },
  {
    file: 'fuel-pump-worn.csv',
    title: 'Fuel pump, slow with a bad bar',
    text: 'Simulated. One ripple in eight is nearly gone and the pump turns slowly at a high current: worn commutator or brushes.',
    cylinders: 4,
    csv: () => pumpCsv(3300, 7.8, [...bars.slice(0, 5), 0.35, ...bars.slice(6)], 133),
  },
  {
    file: 'rail-pressure-holds.csv',
    title: 'Rail pressure that holds',
    text: 'Simulated. The pump builds about 345 kPa, and it stays when the pump stops.',
    cylinders: 4,
    csv: () => pressureCsv(90, 141),
  },
  {
    file: 'rail-pressure-leaks.csv',
    title: 'Rail pressure that leaks away',
    text: 'Simulated. The pressure is built and gone within seconds: a check valve, a regulator or an injector leaks.',
    cylinders: 4,
    csv: () => pressureCsv(1.6, 143),
  },
];
