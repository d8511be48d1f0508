import { and, eq } from 'drizzle-orm';
import type { Circuit } from '../../engine/circuit.ts';
import { SHAPE_LENGTH, SHAPE_VERSION } from '../../engine/comparison/shapes/shape-of.ts';
import { db } from '../db/client.ts';
import { knownGood, knownGoodSignal, shapeEdition } from '../db/schema.ts';
import type { Shapes } from './nearest-shapes.ts';
import { shapeOfBytes } from './picture-of.ts';

/** Most numbers kept in memory over all workshops and circuits: 100,000 shapes are 51 MB. */
const LIMIT_BYTES = 256 * 1024 * 1024;

interface Kept {
  readonly edition: number;
  readonly shapes: Shapes;
}
const kept = new Map<string, Kept>();
const loading = new Map<string, Promise<Kept>>();

/**
 * The published shapes of one circuit of one workshop, from memory as long as nothing was published or retired since: the
 * edition is asked for every time. Held by the process only as a cache; the rows are what counts.
 */
export async function shapesOf(workshopId: string, circuit: Circuit): Promise<Shapes> {
  const [row] = await db()
    .select({ edition: shapeEdition.edition })
    .from(shapeEdition)
    .where(eq(shapeEdition.workshopId, workshopId));
  const edition = row?.edition ?? 0;
  const key = `${workshopId} ${circuit}`;
  const known = kept.get(key);
  if (known?.edition === edition) {
    kept.delete(key);
    kept.set(key, known);
    return known.shapes;
  }
  const name = `${key} ${edition}`;
  const running = loading.get(name) ?? load(workshopId, circuit, edition).finally(() => loading.delete(name));
  loading.set(name, running);
  const loaded = await running;
  kept.delete(key);
  kept.set(key, loaded);
  trim();
  return loaded.shapes;
}

function trim(): void {
  let held = 0;
  for (const { shapes } of kept.values()) held += shapes.numbers.byteLength;
  for (const [key, { shapes }] of kept) {
    if (held <= LIMIT_BYTES || kept.size === 1) return;
    kept.delete(key);
    held -= shapes.numbers.byteLength;
  }
}

async function load(workshopId: string, circuit: Circuit, edition: number): Promise<Kept> {
  const rows = await db()
    .select({ id: knownGoodSignal.knownGoodId, index: knownGoodSignal.index, shape: knownGoodSignal.shape })
    .from(knownGoodSignal)
    .innerJoin(knownGood, eq(knownGood.id, knownGoodSignal.knownGoodId))
    .where(
      and(
        eq(knownGood.workshopId, workshopId),
        eq(knownGood.state, 'published'),
        eq(knownGoodSignal.circuit, circuit),
        eq(knownGoodSignal.shapeVersion, SHAPE_VERSION),
      ),
    );
  const numbers = new Float32Array(rows.length * SHAPE_LENGTH);
  const ids: string[] = [];
  const indices: number[] = [];
  for (const row of rows) {
    const shape = row.shape && shapeOfBytes(row.shape);
    if (!shape) continue;
    numbers.set(shape, ids.length * SHAPE_LENGTH);
    ids.push(row.id);
    indices.push(row.index);
  }
  return { edition, shapes: { ids, indices, numbers: numbers.subarray(0, ids.length * SHAPE_LENGTH) } };
}
