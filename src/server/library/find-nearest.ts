import { and, eq, inArray } from 'drizzle-orm';
import type { NearestJson } from '../../contract/areas/library.ts';
import { whyNear } from '../../engine/comparison/shapes/distance.ts';
import { portraitOf } from '../../engine/comparison/shapes/portrait.ts';
import { SHAPE_LENGTH, shapeVector } from '../../engine/comparison/shapes/shape-of.ts';
import type { CaptureRecord } from '../access.ts';
import { db } from '../db/client.ts';
import { captureSignal, knownGood, knownGoodSignal } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { engineJson } from './known-good-json.ts';
import { mutable } from './mutable.ts';
import { nearestShapes } from './nearest-shapes.ts';
import { shapesOf } from './shape-index.ts';
import { sideOfCapture } from './side-of-capture.ts';

/**
 * Published known-goods of the signal's circuit in the capture's workshop, nearest shape first. A signal without a shape (no
 * wheel, no event) is answered with the reason and nothing.
 * @throws ApiError not_ready, invalid (no such signal).
 */
export async function findNearest(
  row: CaptureRecord,
  input: { readonly signal: number; readonly limit: number },
): Promise<NearestJson> {
  if (row.status !== 'ready') throw new ApiError('not_ready');
  const [known] = await db()
    .select({ circuit: captureSignal.circuit })
    .from(captureSignal)
    .where(and(eq(captureSignal.captureId, row.id), eq(captureSignal.index, input.signal)));
  if (!known)
    throw new ApiError('invalid', {
      details: [{ path: 'signal', message: 'there is no such signal in this capture' }],
    });
  const side = await sideOfCapture(row, input.signal);
  const shape = shapeVector(side);
  const portrait = portraitOf(side);
  if (!shape) return { reason: REASON, searched: 0, portrait: portrait && mutable(portrait), items: [] };
  const shapes = await shapesOf(row.workshopId, side.circuit);
  const near = nearestShapes(shapes.numbers, shape, input.limit);
  const ids = [...new Set(near.map(({ place }) => shapes.ids[place]!))];
  const rows =
    ids.length === 0
      ? []
      : await db()
          .select({ good: knownGood, index: knownGoodSignal.index, portrait: knownGoodSignal.portrait })
          .from(knownGoodSignal)
          .innerJoin(knownGood, eq(knownGood.id, knownGoodSignal.knownGoodId))
          .where(and(inArray(knownGood.id, ids), eq(knownGood.state, 'published')));
  const items = near.flatMap(({ place, distance }) => {
    const found = rows.find(
      ({ good, index }) => good.id === shapes.ids[place] && index === shapes.indices[place],
    );
    if (!found) return [];
    const theirs = shapes.numbers.subarray(place * SHAPE_LENGTH, (place + 1) * SHAPE_LENGTH);
    return {
      knownGoodId: found.good.id,
      signal: found.index,
      engine: engineJson(found.good),
      condition: found.good.condition,
      note: found.good.note,
      distance,
      why: whyNear(side.circuit, shape, theirs),
      portrait: found.portrait && mutable(found.portrait),
    };
  });
  return { reason: null, searched: shapes.ids.length, portrait: portrait && mutable(portrait), items };
}

const REASON =
  'This signal has no shape to look for: no wheel, event or period was found in it. The words in the search still find known-goods.';
