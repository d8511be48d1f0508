import { and, eq, inArray, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { comparisonInput } from '../../contract/areas/library.ts';
import type { Circuit } from '../../engine/circuit.ts';
import { type CaptureRecord, OPENERS, type PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { captureSignal, comparison, knownGood, knownGoodSignal } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { newId } from '../ids.ts';
import { QUEUES } from '../queue/names.ts';
import { inTransaction } from '../queue/transaction.ts';
import type { StoredRequest } from './comparison-request.ts';

type Input = z.infer<typeof comparisonInput>;
type Target = Pick<StoredRequest, 'knownGoodIds' | 'otherCaptureId' | 'otherSignal'>;

const invalid = (path: string, message: string) => new ApiError('invalid', { details: [{ path, message }] });

/** The signal of the same circuit; when there are several the person must say which. */
function sameCircuit(
  signals: readonly { index: number; circuit: Circuit }[],
  circuit: Circuit,
  wanted?: number,
): number {
  if (wanted !== undefined) {
    const chosen = signals.find((signal) => signal.index === wanted);
    if (!chosen) throw invalid('otherSignal', 'there is no such signal in the reference');
    if (chosen.circuit !== circuit)
      throw invalid(
        'otherSignal',
        `${chosen.circuit} cannot be compared with ${circuit}; choose a signal of one circuit`,
      );
    return wanted;
  }
  const alike = signals.filter((signal) => signal.circuit === circuit);
  if (alike.length === 0) throw invalid('signal', `the reference holds no ${circuit}`);
  return alike[0]!.index;
}

async function targetOf(
  caller: PersonCaller,
  input: Input,
  circuit: Circuit,
  workshopId: string,
): Promise<Target> {
  if ('knownGoodId' in input) {
    const good = await OPENERS.knownGood(caller, 'knownGoods.get', input.knownGoodId);
    if (good.state !== 'published' && good.state !== 'superseded')
      throw new ApiError('conflict', {
        message: `This known-good is ${good.state}; only a published one is a reference.`,
      });
    const signals = await db().select().from(knownGoodSignal).where(eq(knownGoodSignal.knownGoodId, good.id));
    const otherSignal = sameCircuit(signals, circuit, input.otherSignal);
    return { knownGoodIds: [good.id], otherCaptureId: null, otherSignal };
  }
  if ('captureId' in input) {
    const other = await OPENERS.capture(caller, 'captures.get', input.captureId);
    if (other.status !== 'ready') throw new ApiError('not_ready');
    const signals = await db().select().from(captureSignal).where(eq(captureSignal.captureId, other.id));
    const otherSignal = sameCircuit(signals, circuit, input.otherSignal);
    return { knownGoodIds: [], otherCaptureId: other.id, otherSignal };
  }
  const { engine, condition } = input.band;
  if (input.band.circuit !== circuit) throw invalid('band.circuit', `this signal is ${circuit}`);
  const members = await db()
    .selectDistinct({ id: knownGood.id, publishedAt: knownGood.publishedAt })
    .from(knownGood)
    .innerJoin(
      knownGoodSignal,
      and(eq(knownGoodSignal.knownGoodId, knownGood.id), eq(knownGoodSignal.circuit, circuit)),
    )
    .where(
      and(
        inArray(knownGood.workshopId, [workshopId]),
        eq(knownGood.state, 'published'),
        eq(knownGood.make, engine.make),
        eq(knownGood.model, engine.model),
        engine.code ? eq(knownGood.code, engine.code) : undefined,
        eq(knownGood.condition, condition),
      ),
    )
    .orderBy(sql`${knownGood.publishedAt} desc`)
    .limit(50);
  if (members.length < 3)
    throw new ApiError('conflict', {
      message: `A band needs three published known-goods of one engine, circuit and condition; there ${members.length === 1 ? 'is' : 'are'} ${members.length}.`,
      hint: 'Compare with a single known-good instead.',
    });
  return { knownGoodIds: members.map((member) => member.id), otherCaptureId: null, otherSignal: null };
}

/**
 * Writes what is to be compared and queues the work, in one transaction.
 * @throws ApiError not_ready, invalid (other circuits, no such signal), conflict (not published, too few for a band).
 */
export async function createComparison(caller: PersonCaller, row: CaptureRecord, input: Input) {
  if (row.status !== 'ready') throw new ApiError('not_ready');
  const [signal] = await db()
    .select()
    .from(captureSignal)
    .where(and(eq(captureSignal.captureId, row.id), eq(captureSignal.index, input.signal)));
  if (!signal) throw invalid('signal', 'there is no such signal in this capture');
  const target = await targetOf(caller, input, signal.circuit, row.workshopId);
  const request: StoredRequest = { signal: input.signal, asked: input, ...target };
  const id = newId();
  await inTransaction(async ({ tx, send }) => {
    await tx
      .insert(comparison)
      .values({ id, workshopId: row.workshopId, createdBy: caller.personId, captureId: row.id, request });
    await send(QUEUES.compare, { comparisonId: id });
  });
  return { id, status: 'queued' as const };
}
