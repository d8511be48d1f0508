import type { ToothWheel } from '../physics/pick-up.ts';

/** An engine that does not exist, as its maker would describe it if it did. */
export interface StarterEngine {
  readonly make: string;
  readonly model: string;
  readonly code: string;
  readonly year: number;
  readonly yearTo: number;
  readonly cylinders: number;
  readonly wheel: Pick<ToothWheel, 'places' | 'missing'>;
  readonly sensor: 'two-wire' | 'three-wire';
  /** Where the cam's output is high, crank degrees of 720 after the reference mark. */
  readonly camHighDeg: readonly (readonly [number, number])[];
  readonly sprocketTeeth: number;
  readonly crankingRpm: number;
  /** Peak of the pick-up's swing at 200 rev/min. */
  readonly peakV: number;
  readonly coil: {
    readonly henry: number;
    readonly ohm: number;
    readonly dwellS: number;
    readonly kickV: number;
    readonly burnS: number;
    readonly burnV: number;
    readonly clampV: number;
  };
  readonly injector: { readonly widthS: number; readonly clampV: number; readonly humpV: number };
  readonly starter: { readonly inrushA: number; readonly meanA: number; readonly humpA: number };
}

export const STARTER_ENGINES: readonly StarterEngine[] = [
  {
    make: 'Aldane',
    model: 'Sorrel 1.6',
    code: 'AS16-A',
    year: 2009,
    yearTo: 2013,
    cylinders: 4,
    wheel: { places: 60, missing: 2 },
    sensor: 'two-wire',
    camHighDeg: [
      [57, 137],
      [297, 369],
      [537, 669],
    ],
    sprocketTeeth: 20,
    crankingRpm: 205,
    peakV: 1.1,
    coil: { henry: 0.0034, ohm: 0.62, dwellS: 0.0044, kickV: 262, burnS: 0.0013, burnV: 33, clampV: 365 },
    injector: { widthS: 0.0096, clampV: 64, humpV: 1.5 },
    starter: { inrushA: 520, meanA: 105, humpA: 62 },
  },
  {
    make: 'Brennick',
    model: 'Tarn 2.0',
    code: 'BT20-4',
    year: 2012,
    yearTo: 2016,
    cylinders: 4,
    wheel: { places: 36, missing: 1 },
    sensor: 'two-wire',
    camHighDeg: [
      [40, 100],
      [220, 330],
      [460, 500],
      [580, 690],
    ],
    sprocketTeeth: 24,
    crankingRpm: 188,
    peakV: 1.7,
    coil: { henry: 0.0026, ohm: 0.45, dwellS: 0.0033, kickV: 305, burnS: 0.0016, burnV: 29, clampV: 400 },
    injector: { widthS: 0.0122, clampV: 52, humpV: 1.9 },
    starter: { inrushA: 640, meanA: 140, humpA: 78 },
  },
  {
    make: 'Zeldrik',
    model: 'Moor 1.2',
    code: 'ZM12',
    year: 2015,
    yearTo: 2021,
    cylinders: 3,
    wheel: { places: 36, missing: 2 },
    sensor: 'three-wire',
    camHighDeg: [
      [20, 200],
      [260, 440],
      [500, 560],
    ],
    sprocketTeeth: 22,
    crankingRpm: 232,
    peakV: 1,
    coil: { henry: 0.0018, ohm: 0.38, dwellS: 0.0026, kickV: 340, burnS: 0.001, burnV: 41, clampV: 430 },
    injector: { widthS: 0.0071, clampV: 71, humpV: 1.3 },
    starter: { inrushA: 410, meanA: 88, humpA: 55 },
  },
  {
    make: 'Ondrave',
    model: 'Lapwin 2.4',
    code: 'OL24-6',
    year: 2006,
    yearTo: 2010,
    cylinders: 6,
    wheel: { places: 24, missing: 1 },
    sensor: 'two-wire',
    camHighDeg: [
      [90, 150],
      [330, 390],
      [570, 630],
    ],
    sprocketTeeth: 19,
    crankingRpm: 176,
    peakV: 2.4,
    coil: { henry: 0.0051, ohm: 0.9, dwellS: 0.0055, kickV: 228, burnS: 0.0018, burnV: 25, clampV: 345 },
    injector: { widthS: 0.0141, clampV: 44, humpV: 2.1 },
    starter: { inrushA: 760, meanA: 168, humpA: 60 },
  },
  {
    make: 'Quorvel',
    model: 'Dray 2.2',
    code: 'QD22',
    year: 2008,
    yearTo: 2014,
    cylinders: 4,
    wheel: { places: 30, missing: 2 },
    sensor: 'two-wire',
    camHighDeg: [
      [110, 290],
      [480, 520],
    ],
    sprocketTeeth: 21,
    crankingRpm: 214,
    peakV: 0.8,
    coil: { henry: 0.0041, ohm: 0.55, dwellS: 0.0061, kickV: 281, burnS: 0.0011, burnV: 37, clampV: 380 },
    injector: { widthS: 0.0085, clampV: 58, humpV: 1.7 },
    starter: { inrushA: 690, meanA: 150, humpA: 95 },
  },
  {
    make: 'Tembrik',
    model: 'Ivrel 1.5',
    code: 'TI15',
    year: 2016,
    yearTo: 2020,
    cylinders: 4,
    wheel: { places: 60, missing: 2 },
    sensor: 'three-wire',
    camHighDeg: [
      [20, 80],
      [190, 330],
      [410, 450],
      [560, 640],
    ],
    sprocketTeeth: 23,
    crankingRpm: 221,
    peakV: 1,
    coil: { henry: 0.0022, ohm: 0.5, dwellS: 0.0029, kickV: 322, burnS: 0.0014, burnV: 31, clampV: 415 },
    injector: { widthS: 0.0064, clampV: 68, humpV: 1.2 },
    starter: { inrushA: 470, meanA: 96, humpA: 58 },
  },
  {
    make: 'Ulfane',
    model: 'Burnel 3.0',
    code: 'UB30-6',
    year: 2010,
    yearTo: 2015,
    cylinders: 6,
    wheel: { places: 48, missing: 2 },
    sensor: 'two-wire',
    camHighDeg: [
      [70, 130],
      [170, 230],
      [410, 590],
    ],
    sprocketTeeth: 20,
    crankingRpm: 181,
    peakV: 1.4,
    coil: { henry: 0.003, ohm: 0.71, dwellS: 0.0038, kickV: 247, burnS: 0.0021, burnV: 27, clampV: 355 },
    injector: { widthS: 0.0108, clampV: 61, humpV: 1.6 },
    starter: { inrushA: 820, meanA: 182, humpA: 70 },
  },
];
