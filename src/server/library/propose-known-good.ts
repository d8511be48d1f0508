import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { knownGoodInput } from '../../contract/areas/library.ts';
import { measureCapture } from '../../engine/measure.ts';
import { type KnownGoodRecord, OPENERS, type PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { knownGood, knownGoodSignal } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { newId } from '../ids.ts';
import { loadCaptureInput } from '../storage/load-samples.ts';
import { cutStretch, storedAxisOf } from './freeze.ts';
import { pictureOf } from './picture-of.ts';
import { sideOf } from './side.ts';
import { writeFrozen } from './write-frozen.ts';

const invalid = (path: string, message: string) => new ApiError('invalid', { details: [{ path, message }] });

/**
 * Proposes signals of a measured capture as a known-good. Samples and values are frozen now: the store is written first,
 * the rows last, so that a proposal is never there without its samples.
 * @throws ApiError not_ready, invalid (unknown signal, empty or too long a stretch), conflict (a newer version is there), service_away.
 */
export async function proposeKnownGood(caller: PersonCaller, input: z.infer<typeof knownGoodInput>) {
  const capture = await OPENERS.capture(caller, 'captures.get', input.captureId);
  if (capture.status !== 'ready' || capture.axis === null) throw new ApiError('not_ready');
  const before = await olderVersion(caller, input.supersedes, capture.workshopId);
  const signals = [...new Set(input.signals)].sort((a, b) => a - b);
  const loaded = await loadCaptureInput(capture, signals);
  const missing = signals.filter((index) => !loaded.signals.some((signal) => signal.index === index));
  if (missing.length > 0)
    throw invalid('signals', `there is no signal ${missing.join(', ')} in this capture`);
  const { engine } = input;
  if (engine.year !== null && engine.yearTo !== null && engine.yearTo < engine.year)
    throw invalid('engine.yearTo', 'the last year lies before the first');
  const cylinders = engine.cylinders ?? capture.cylinders;
  const stretch = cutStretch({ ...loaded, cylinders }, input.from ?? -Infinity, input.to ?? Infinity);
  const findings = measureCapture(stretch);
  const axis = storedAxisOf(stretch.axis);
  const id = newId();
  await writeFrozen(id, stretch);
  const startS = axis.startS;
  const endS = axis.kind === 'even' ? axis.startS + (axis.count - 1) * axis.stepS : axis.endS;
  await db().transaction(async (tx) => {
    await tx.insert(knownGood).values({
      id,
      workshopId: capture.workshopId,
      createdBy: caller.personId,
      captureId: capture.id,
      ...engine,
      cylinders,
      condition: input.condition,
      note: input.note,
      provenance: input.provenance,
      instrument: input.instrument,
      probe: input.probe,
      confirmed: input.confirmed,
      wheelPattern: findings.wheel?.pattern ?? null,
      supersedes: before?.id ?? null,
      version: (before?.version ?? 0) + 1,
      fromS: startS,
      toS: endS,
      axis,
      engineVersion: findings.engine,
      findings: { signals: [...findings.signals], relations: [...findings.relations], wheel: findings.wheel },
    });
    await tx.insert(knownGoodSignal).values(
      stretch.signals.map((signal) => {
        const side = sideOf(stretch, signal.index, findings);
        return {
          knownGoodId: id,
          index: signal.index,
          name: signal.name,
          circuit: signal.circuit,
          unit: signal.unit,
          factor: signal.factor,
          offset: signal.offset,
          ...(side && pictureOf(side)),
        };
      }),
    );
  });
  return id;
}

/** The known-good that the new one is a version of: of the same workshop, published, and not replaced already. */
async function olderVersion(
  caller: PersonCaller,
  id: string | null,
  workshopId: string,
): Promise<KnownGoodRecord | null> {
  if (id === null) return null;
  const before = await OPENERS.knownGood(caller, 'knownGoods.get', id);
  if (before.workshopId !== workshopId) throw new ApiError('not_found');
  if (before.supersededBy !== null) {
    const [newer] = await db().select().from(knownGood).where(eq(knownGood.id, before.supersededBy));
    throw new ApiError('conflict', {
      message: `It has been replaced by version ${newer?.version ?? before.version + 1}; propose a version of that one.`,
    });
  }
  if (before.state !== 'published')
    throw new ApiError('conflict', {
      message: `It is ${before.state}; only a published one is replaced by a new version.`,
    });
  return before;
}
