import { and, eq, lt } from 'drizzle-orm';
import { SHAPE_VERSION } from '../../engine/comparison/shapes/shape-of.ts';
import { db } from '../db/client.ts';
import { knownGood, knownGoodSignal } from '../db/schema.ts';
import { bumpShapes } from './bump-shapes.ts';
import { pictureOf } from './picture-of.ts';
import { sideOfKnownGood } from './side-of-known-good.ts';

const AT_A_TIME = 200;

/** Makes pictures and shapes that are missing or were made by an earlier version. Returns how many. */
export async function fillPictures(): Promise<number> {
  const due = await db()
    .select({ good: knownGood, index: knownGoodSignal.index })
    .from(knownGoodSignal)
    .innerJoin(knownGood, eq(knownGood.id, knownGoodSignal.knownGoodId))
    .where(lt(knownGoodSignal.shapeVersion, SHAPE_VERSION))
    .limit(AT_A_TIME);
  for (const { good, index } of due) {
    const picture = pictureOf(await sideOfKnownGood(good, index));
    await db().transaction(async (tx) => {
      await tx
        .update(knownGoodSignal)
        .set(picture)
        .where(and(eq(knownGoodSignal.knownGoodId, good.id), eq(knownGoodSignal.index, index)));
      await bumpShapes(tx, good.workshopId);
    });
  }
  return due.length;
}
