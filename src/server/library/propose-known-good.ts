import type { z } from 'zod';
import type { knownGoodInput } from '../../contract/areas/library.ts';
import { measureCapture } from '../../engine/measure.ts';
import { OPENERS, type PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { knownGood, knownGoodSignal } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { newId } from '../ids.ts';
import { knownGoodSamplesKey, knownGoodTimesKey } from '../storage/keys.ts';
import { loadCaptureInput } from '../storage/load-samples.ts';
import { putObject } from '../storage/put-object.ts';
import { bytesOf } from '../storage/typed-bytes.ts';
import { cutStretch, storedAxisOf } from './freeze.ts';

/**
 * Proposes signals of a measured capture as a known-good. Samples and values are frozen now: the store is written first,
 * the rows last, so that a proposal is never there without its samples.
 * @throws ApiError not_ready, invalid (unknown signal, empty or too long a stretch), service_away.
 */
export async function proposeKnownGood(caller: PersonCaller, input: z.infer<typeof knownGoodInput>) {
  const capture = await OPENERS.capture(caller, 'captures.get', input.captureId);
  if (capture.status !== 'ready' || capture.axis === null) throw new ApiError('not_ready');
  const signals = [...new Set(input.signals)].sort((a, b) => a - b);
  const loaded = await loadCaptureInput(capture, signals);
  const missing = signals.filter((index) => !loaded.signals.some((signal) => signal.index === index));
  if (missing.length > 0)
    throw new ApiError('invalid', {
      details: [{ path: 'signals', message: `there is no signal ${missing.join(', ')} in this capture` }],
    });
  const cylinders = input.engine.cylinders ?? capture.cylinders;
  const stretch = cutStretch({ ...loaded, cylinders }, input.from ?? -Infinity, input.to ?? Infinity);
  const findings = measureCapture(stretch);
  const axis = storedAxisOf(stretch.axis);
  const id = newId();
  for (const signal of stretch.signals)
    await putObject(knownGoodSamplesKey(id, signal.index), bytesOf(signal.samples));
  if (stretch.axis.kind === 'uneven') await putObject(knownGoodTimesKey(id), bytesOf(stretch.axis.timesS));
  const startS = axis.startS;
  const endS = axis.kind === 'even' ? axis.startS + (axis.count - 1) * axis.stepS : axis.endS;
  await db().transaction(async (tx) => {
    await tx.insert(knownGood).values({
      id,
      workshopId: capture.workshopId,
      createdBy: caller.personId,
      captureId: capture.id,
      make: input.engine.make,
      model: input.engine.model,
      code: input.engine.code,
      year: input.engine.year,
      cylinders,
      condition: input.condition,
      note: input.note,
      provenance: input.provenance,
      fromS: startS,
      toS: endS,
      axis,
      engineVersion: findings.engine,
      findings: { signals: [...findings.signals], relations: [...findings.relations], wheel: findings.wheel },
    });
    await tx.insert(knownGoodSignal).values(
      stretch.signals.map((signal) => ({
        knownGoodId: id,
        index: signal.index,
        name: signal.name,
        circuit: signal.circuit,
        unit: signal.unit,
        factor: signal.factor,
        offset: signal.offset,
      })),
    );
  });
  return id;
}
