import { describe, expect, it } from 'vitest';
import { STARTER_ENGINES } from '../../samples/starter/engines.ts';
import type { StarterFault } from '../../samples/starter/faults.ts';
import { RECORDERS, type RecordingKind } from '../../samples/starter/record.ts';
import { shapeDistance } from '../../src/engine/comparison/shapes/distance.ts';
import { shapeVector } from '../../src/engine/comparison/shapes/shape-of.ts';
import { sidesOf } from './side-kit.ts';

/**
 * The outside here is the generator (samples/starter): it knows engine and fault of every recording. Held-out ones have another
 * seed: another vehicle, speed, phase and noise. "Find it" means that one of the five nearest is of the same engine and fault.
 */
const CASES: readonly (readonly [RecordingKind, number, readonly StarterFault[]])[] = [
  ['crank and cam', 0, ['none', 'wide air gap', 'chipped tooth', 'bent wheel', 'reversed wires']],
  ['crank and cam', 1, ['none', 'belt slipped one tooth', 'belt slipped two teeth']],
  ['coil', 0, ['none', 'shorted turns', 'open secondary', 'weak driver']],
  ['injector', 0, ['none', 'injector without hump']],
  ['starter', 0, ['none', 'no compression', 'one weak cylinder']],
];
const KEPT = 2;
const HELD_OUT = 1;

interface Entry {
  readonly engine: string;
  readonly fault: StarterFault;
  /** Null: no wheel or event was found; such a one is not in the library, and a held-out one counts as missed. */
  readonly shape: Float32Array | null;
}

async function shapesOf(
  kind: RecordingKind,
  signal: number,
  faults: readonly StarterFault[],
  seeds: readonly number[],
): Promise<Entry[]> {
  const entries: Entry[] = [];
  for (const engine of STARTER_ENGINES)
    for (const fault of faults) {
      // Lets the runner's messages through.
      await new Promise((done) => setImmediate(done));
      const twoWireOnly = signal === 0 && kind === 'crank and cam' && fault !== 'none';
      if (twoWireOnly && engine.sensor === 'three-wire') continue;
      for (const seed of seeds) {
        const side = sidesOf(RECORDERS[kind](engine, { seed, fault }), engine.cylinders)[signal]!;
        const shape = shapeVector(side);
        entries.push({ engine: engine.model, fault, shape });
      }
    }
  return entries;
}

const seedsFrom = (first: number, count: number) => Array.from({ length: count }, (_, i) => first + i * 13);

describe('shapeVector()', () => {
  it('finds engine and fault among the five nearest for at least 95 % of held-out recordings', async () => {
    let found = 0;
    let first = 0;
    let asked = 0;
    const missed: string[] = [];
    for (const [kind, signal, faults] of CASES) {
      const library = await shapesOf(kind, signal, faults, seedsFrom(100, KEPT));
      for (const wanted of await shapesOf(kind, signal, faults, seedsFrom(9000, HELD_OUT))) {
        const five = library
          .flatMap((entry) =>
            entry.shape === null || wanted.shape === null
              ? []
              : [{ entry, distance: shapeDistance(entry.shape, wanted.shape) }],
          )
          .sort((a, b) => a.distance - b.distance)
          .slice(0, 5)
          .map(({ entry }) => entry);
        const same = (entry: Entry | undefined) =>
          entry?.engine === wanted.engine && entry.fault === wanted.fault;
        asked += 1;
        if (same(five[0])) first += 1;
        if (five.some(same)) found += 1;
        else
          missed.push(
            `${kind} ${signal}: ${wanted.engine} ${wanted.fault}, nearest ${five.map((e) => `${e.engine} ${e.fault}`).join('; ')}`,
          );
      }
    }
    console.info(`nearest: ${found} of ${asked} found among five, ${first} as the first`);
    expect(asked).toBeGreaterThan(90);
    expect(found / asked, missed.join('\n')).toBeGreaterThanOrEqual(0.95);
    expect(first / asked).toBeGreaterThan(0.75);
  }, 600_000);
});
