import { and, eq, inArray, isNull } from 'drizzle-orm';
import { type ComparisonJson, comparison as comparisonShape } from '../../contract/areas/library.ts';
import { type CompareOptions, compare } from '../../engine/comparison/compare.ts';
import type { ComparisonFindings, Side } from '../../engine/comparison/types.ts';
import { ENGINE_VERSION } from '../../engine/version.ts';
import { db } from '../db/client.ts';
import { capture, comparison, knownGood, knownGoodSignal } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { type StoredRequest, storedRequest } from './comparison-request.ts';
import { sideOfCapture } from './side-of-capture.ts';
import { sideOfKnownGood } from './side-of-known-good.ts';

type Result = Partial<ComparisonJson>;

async function captureById(id: string) {
  const [row] = await db()
    .select()
    .from(capture)
    .where(and(eq(capture.id, id), isNull(capture.deletedAt)));
  if (!row) throw new ApiError('not_found', { message: 'The capture was deleted before it was compared.' });
  return row;
}

async function referencesOf(
  request: StoredRequest,
  here: Side,
): Promise<{ sides: Side[]; other: NonNullable<Result['other']> }> {
  if (request.otherCaptureId !== null && request.otherSignal !== null) {
    const other = await captureById(request.otherCaptureId);
    const side = await sideOfCapture(other, request.otherSignal);
    return {
      sides: [side],
      other: { kind: 'capture', id: other.id, title: other.title, signal: request.otherSignal, n: 1 },
    };
  }
  const goods = await db().select().from(knownGood).where(inArray(knownGood.id, request.knownGoodIds));
  const sides: Side[] = [];
  const members: NonNullable<NonNullable<Result['other']>['members']> = [];
  let signal = request.otherSignal ?? 0;
  for (const good of goods) {
    const rows = await db().select().from(knownGoodSignal).where(eq(knownGoodSignal.knownGoodId, good.id));
    const index = request.otherSignal ?? rows.find((row) => row.circuit === here.circuit)?.index;
    if (index === undefined) continue;
    if (sides.length === 0) signal = index;
    sides.push(await sideOfKnownGood(good, index));
    members.push({
      id: good.id,
      title: [good.make, good.model, good.code, good.year ?? ''].filter((part) => part !== '').join(' '),
      version: good.version,
    });
  }
  const first = goods[0];
  if (!first || sides.length === 0)
    throw new ApiError('not_found', { message: 'The reference is no longer there.' });
  const engine = [first.make, first.model, first.code].filter(Boolean).join(' ');
  const title = `${engine}, ${first.condition}`;
  const single = request.knownGoodIds.length === 1;
  return {
    sides,
    other: {
      kind: single ? 'knownGood' : 'band',
      id: single ? first.id : null,
      title,
      signal,
      n: sides.length,
      members,
    },
  };
}

const resultShape = comparisonShape.pick({
  alignment: true,
  rows: true,
  shape: true,
  overlay: true,
  camShift: true,
  says: true,
  text: true,
});

/** What is kept has the contract's shape, checked here once. */
const resultOf = (found: ComparisonFindings): Result => resultShape.parse(found);

/** What a person set by hand; the sprocket's teeth may have come with the request. */
function optionsOf(row: typeof comparison.$inferSelect, request: StoredRequest): CompareOptions {
  const set = row.adjustment;
  const kept = row.result?.rows;
  return {
    byHand: set && set.shift !== null && set.axis !== null ? { shift: set.shift, axis: set.axis } : null,
    sprocketTeeth: set?.sprocketTeeth ?? request.asked.sprocketTeeth ?? null,
    // The table stays as it was first made, by the engine version that it names.
    ...(kept === undefined ? {} : { rows: kept }),
  };
}

/** What the worker does for one comparison. A refusal in words is kept as its error; anything else is thrown, to be tried again. */
export async function runComparison(id: string): Promise<void> {
  const [row] = await db().select().from(comparison).where(eq(comparison.id, id));
  if (!row || row.status === 'ready') return;
  await db().update(comparison).set({ status: 'running' }).where(eq(comparison.id, id));
  try {
    const request = storedRequest.parse(row.request);
    const own = await captureById(row.captureId);
    const here = await sideOfCapture(own, request.signal);
    const { sides, other } = await referencesOf(request, here);
    const result: Result = {
      ...resultOf(compare(here, sides, optionsOf(row, request))),
      engine: row.result?.engine ?? ENGINE_VERSION,
      here: { title: own.title, name: here.name, circuit: here.circuit, unit: here.unit },
      other,
    };
    await db().update(comparison).set({ status: 'ready', error: null, result }).where(eq(comparison.id, id));
  } catch (thrown) {
    if (!(thrown instanceof ApiError) || thrown.code === 'service_away') throw thrown;
    await db()
      .update(comparison)
      .set({ status: 'failed', error: thrown.message })
      .where(eq(comparison.id, id));
  }
}
