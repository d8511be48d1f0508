import { eq } from 'drizzle-orm';
import type { Side } from '../../engine/comparison/types.ts';
import { ENGINE_VERSION } from '../../engine/version.ts';
import type { CaptureRecord } from '../access.ts';
import { db } from '../db/client.ts';
import { measurement } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { loadCaptureInput } from '../storage/load-samples.ts';
import { currentFindings, sideOf } from './side.ts';

/** One signal of a measured capture. @throws ApiError not_ready, not_found (no such signal). */
export async function sideOfCapture(row: CaptureRecord, signal: number): Promise<Side> {
  const [kept] = await db().select().from(measurement).where(eq(measurement.captureId, row.id));
  if (!kept || kept.samplesVersion !== row.samplesVersion) throw new ApiError('not_ready');
  const findings = await currentFindings(
    {
      engine: kept.engine,
      findings: { signals: kept.signals, relations: kept.relations, wheel: kept.wheel },
    },
    ENGINE_VERSION,
    () => loadCaptureInput(row),
  );
  const side = sideOf(await loadCaptureInput(row, [signal]), signal, findings);
  if (!side) throw new ApiError('not_found');
  return side;
}
