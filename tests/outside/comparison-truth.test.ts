import { describe, expect, it } from 'vitest';
import { crankMotion } from '../../samples/physics/crank-motion.ts';
import { pickUpVolts } from '../../samples/physics/pick-up.ts';
import { seededNormal, seededUniform } from '../../samples/physics/random.ts';
import { toothStretches, twoLevels } from '../../samples/physics/two-levels.ts';
import { STARTER_ENGINES } from '../../samples/starter/engines.ts';
import { coil, crankAndCam } from '../../samples/starter/record.ts';
import { compare } from '../../src/engine/comparison/compare.ts';
import type { Side } from '../../src/engine/comparison/types.ts';
import { sidesOf } from './side-kit.ts';

/**
 * The outside here is arithmetic on simulated captures: the generator knows every angle, and one tooth of the belt is
 * 360 / teeth of the crank's sprocket degrees. Speeds, wheels, phases and noise are seeded.
 */
interface Pair {
  readonly places: number;
  readonly missing: number;
  readonly twoWire: boolean;
  readonly rpm: number;
  readonly lateDeg: number;
  readonly noise: number;
  readonly seed: number;
}

const LOBES = [
  [57, 137],
  [297, 369],
  [537, 669],
] as const;

/** Crank and cam of a wheel at a speed, the cam so many degrees late. */
function recorded(given: Pair): Side[] {
  const uniform = seededUniform(given.seed);
  const normal = seededNormal(given.seed + 1);
  const stepS = Math.min(5e-5, 60 / given.rpm / 6000);
  const count = Math.ceil((4.4 * 60) / given.rpm / stepS);
  const { angleDeg, speedDegS } = crankMotion(
    { rpm: given.rpm, cylinders: 4, dip: 0.04, startDeg: 360 * uniform() },
    stepS,
    count,
  );
  const wheel = { places: given.places, missing: given.missing, runOut: 0.03 };
  const crank = given.twoWire
    ? pickUpVolts(wheel, angleDeg, speedDegS, 1.2)
    : twoLevels(toothStretches(given.places, given.missing, 0.5), 360, angleDeg, stepS, {
        low: 0.1,
        high: 4.9,
        riseS: 1e-6,
      });
  const peak = given.twoWire ? (1.2 * given.rpm) / 200 : 2.4;
  const high = LOBES.map(([from, to]) => [(from + given.lateDeg) % 720, (to + given.lateDeg) % 720] as const);
  const cam = twoLevels(high, 720, angleDeg, stepS, { low: 0.1, high: 4.9, riseS: 1e-6 });
  const noisy = (values: Float64Array, rms: number) => values.map((value) => value + rms * normal());
  return sidesOf(
    {
      startS: 0,
      stepS,
      columns: [
        { name: 'Crank', unit: 'V', values: noisy(crank, given.noise * peak) },
        { name: 'Cam', unit: 'V', values: noisy(cam, given.noise) },
      ],
    },
    4,
  );
}

const base = { places: 60, missing: 2, twoWire: true, lateDeg: 0, noise: 0.002, rpm: 200, seed: 1 };

/** Median distance in degrees between the falling crossings of the two traces on the overlay. */
function alignedWithin(here: Side, reference: Side): number {
  const overlay = compare(here, [reference]).overlay!;
  const crossings = (values: readonly (number | null)[]) => {
    const found: number[] = [];
    for (let i = 1; i < values.length; i++) {
      const a = values[i - 1] ?? null;
      const b = values[i] ?? null;
      if (a !== null && b !== null && a > 0 && b <= 0) found.push((i - 1 + a / (a - b)) * overlay.step);
    }
    return found;
  };
  const mine = crossings(overlay.here);
  const theirs = crossings(overlay.reference);
  const off = mine
    .map((at) => Math.min(...theirs.map((other) => Math.abs(other - at))))
    .sort((a, b) => a - b);
  expect(off.length).toBeGreaterThan(50);
  return off[Math.floor(off.length / 2)]!;
}

describe('compare() over crank degrees', () => {
  it.each([120, 200, 320, 500, 900])('aligns clean captures at 200 and %i rpm within 0.2 degrees', (rpm) => {
    const [reference] = recorded(base);
    const [here] = recorded({ ...base, rpm, seed: rpm });
    expect(alignedWithin(here!, reference!)).toBeLessThan(0.2);
  });

  it.each([120, 200, 320, 500, 900])('aligns noisy captures at 200 and %i rpm within 0.5 degrees', (rpm) => {
    const [reference] = recorded({ ...base, noise: 0.08, seed: 5 });
    const [here] = recorded({ ...base, rpm, noise: 0.08, seed: rpm + 3 });
    expect(alignedWithin(here!, reference!)).toBeLessThan(0.5);
  });

  it('finds a cam shift of one or two belt teeth within 0.3 degrees and none where there is none, over 200 pairs', async () => {
    const WHEELS = [
      [60, 2],
      [36, 1],
      [36, 2],
      [24, 1],
      [30, 2],
      [48, 2],
      [12, 1],
    ] as const;
    const uniform = seededUniform(77);
    const kept = new Map<string, Side>();
    let worst = 0;
    let asked = 0;
    const trouble: string[] = [];
    for (let k = 0; k < 200; k++) {
      // Lets the runner's messages through.
      if (k % 10 === 0) await new Promise((done) => setImmediate(done));
      const [places, missing] = WHEELS[k % WHEELS.length]!;
      const twoWire = k % 3 !== 0;
      const wheel = { places, missing, twoWire };
      const key = `${places}-${missing} ${twoWire}`;
      const reference = kept.get(key) ?? recorded({ ...base, ...wheel, seed: 900 + k })[1]!;
      kept.set(key, reference);
      const teeth = [18, 19, 20, 21, 22, 23, 24][Math.floor(uniform() * 7)]!;
      const slipped = k % 4 === 0 ? 0 : k % 4 === 3 ? 2 : k % 4 === 1 ? 1 : -1;
      const lateDeg = (720 + (slipped * 360) / teeth) % 720;
      const rpm = 130 + 180 * uniform();
      const here = recorded({ ...base, ...wheel, rpm, lateDeg, noise: 0.01, seed: 4000 + k })[1]!;
      const found = compare(here, [reference], { sprocketTeeth: teeth });
      asked += 1;
      const off = found.camShift === null ? Infinity : Math.abs(found.camShift.deg - (slipped * 360) / teeth);
      if (!(off <= 0.3)) trouble.push(`${key} slipped ${slipped} of ${teeth}: ${found.camShift?.deg}`);
      else {
        worst = Math.max(worst, off);
        expect(Math.abs(found.camShift!.teeth! - slipped)).toBeLessThan(0.05);
        expect(/ (late|early) against the crank/.test(found.text)).toBe(slipped !== 0);
      }
    }
    console.info(`cam shift: worst ${worst.toFixed(3)} degrees over ${asked} pairs`);
    expect(asked).toBe(200);
    expect(trouble.join('\n')).toBe('');
  }, 300_000);

  it('says that the polarity is the other way round instead of hiding it', () => {
    const engine = STARTER_ENGINES[0]!;
    const [here] = sidesOf(crankAndCam(engine, { seed: 3, fault: 'reversed wires' }), 4);
    const [reference] = sidesOf(crankAndCam(engine, { seed: 4 }), 4);
    const found = compare(here!, [reference!]);
    expect(found.alignment.notes.join(' ')).toMatch(/polarity is the other way round/);
    expect(found.rows.find((row) => row.key === 'polarity')?.verdict).toBe('outside');
  });

  it('says that a probe factor is probably missing when everything is a tenth', () => {
    const engine = STARTER_ENGINES[0]!;
    const [reference] = sidesOf(coil(engine, { seed: 4 }), 4);
    const recording = coil(engine, { seed: 5 });
    const tenth = recording.columns
      .slice(0, 1)
      .map((column) => ({ ...column, values: column.values.map((v) => v / 10) }));
    const [here] = sidesOf({ ...recording, columns: tenth }, 4);
    const notes = compare({ ...here!, circuit: 'coil-primary-voltage' }, [reference!]).alignment.notes.join(
      ' ',
    );
    if (here!.circuit === 'coil-primary-voltage') expect(notes).toMatch(/10 times smaller/);
  });

  it('says that without a crank signal the cam’s angle cannot be compared', () => {
    const engine = STARTER_ENGINES[0]!;
    const whole = crankAndCam(engine, { seed: 3 });
    const [alone] = sidesOf({ ...whole, columns: whole.columns.slice(1) }, 4);
    const reference = sidesOf(crankAndCam(engine, { seed: 4 }), 4)[1]!;
    const found = compare(alone!, [reference]);
    expect(found.alignment.notes.join(' ')).toMatch(/no crank signal with a gap in this capture/);
    expect(found.camShift).toBeNull();
  });
});

describe('compare() with a band', () => {
  it('lays lowest, median and highest of the members over the degrees and moves the reference by hand', () => {
    const engine = STARTER_ENGINES[1]!;
    const members = [11, 12, 13, 14].map((seed) => sidesOf(crankAndCam(engine, { seed }), 4)[1]!);
    const here = sidesOf(crankAndCam(engine, { seed: 20, fault: 'belt slipped one tooth' }), 4)[1]!;
    const found = compare(here, members, { sprocketTeeth: engine.sprocketTeeth });
    const { overlay } = found;
    expect(overlay?.low).not.toBeNull();
    overlay!.reference.forEach((middle, i) => {
      const low = overlay!.low![i] ?? null;
      if (middle === null || low === null) return;
      expect(low).toBeLessThanOrEqual(middle);
      expect(overlay!.high![i]!).toBeGreaterThanOrEqual(middle);
    });
    expect(found.text).toContain('1 tooth of the belt or chain at a crank sprocket of 24');
    expect(found.shape.parts.length).toBeGreaterThanOrEqual(6);
    const moved = compare(here, members, { byHand: { shift: 15, axis: 'deg' } });
    expect(moved.shape.parts.length).toBeLessThan(found.shape.parts.length);
    expect(moved.rows).toEqual(found.rows);
    expect(moved.alignment.byHand).toEqual({ shift: 15, axis: 'deg' });
  });

  it('holds 95 % ± 3 of new good members, and calls fewer than 2 % of slipped cams inside', () => {
    const engine = STARTER_ENGINES[2]!;
    const members = Array.from(
      { length: 8 },
      (_, i) => sidesOf(crankAndCam(engine, { seed: 300 + i }), 3)[1]!,
    );
    let inside = 0;
    let asked = 0;
    let slippedInside = 0;
    let slipped = 0;
    for (let k = 0; k < 12; k++) {
      const good = sidesOf(crankAndCam(engine, { seed: 800 + k }), 3)[1]!;
      for (const row of compare(good, members).rows) {
        if (!row.key.startsWith('cam_')) continue;
        asked += 1;
        if (row.verdict === 'inside') inside += 1;
      }
      const late = sidesOf(crankAndCam(engine, { seed: 850 + k, fault: 'belt slipped one tooth' }), 3)[1]!;
      for (const row of compare(late, members).rows) {
        if (!row.key.startsWith('cam_')) continue;
        slipped += 1;
        if (row.verdict === 'inside') slippedInside += 1;
      }
    }
    console.info(
      `band: ${inside} of ${asked} good angles inside, ${slippedInside} of ${slipped} slipped ones`,
    );
    expect(inside / asked).toBeGreaterThanOrEqual(0.92);
    expect(slippedInside / slipped).toBeLessThan(0.02);
  }, 300_000);
});
