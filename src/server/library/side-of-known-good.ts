import { asc, eq } from 'drizzle-orm';
import type { CaptureInput, SignalInput, TimeAxis } from '../../engine/capture.ts';
import type { Side } from '../../engine/comparison/types.ts';
import { ENGINE_VERSION } from '../../engine/version.ts';
import type { KnownGoodRecord } from '../access.ts';
import { db } from '../db/client.ts';
import { knownGoodSignal } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { getBytes } from '../storage/get-bytes.ts';
import { knownGoodSamplesKey, knownGoodTimesKey } from '../storage/keys.ts';
import { asFloat32, asFloat64 } from '../storage/typed-bytes.ts';
import { currentFindings, sideOf } from './side.ts';

async function loadAxis(row: KnownGoodRecord): Promise<TimeAxis> {
  if (row.axis.kind === 'even') return row.axis;
  return {
    kind: 'uneven',
    holds: row.axis.holds,
    timesS: asFloat64(await getBytes(knownGoodTimesKey(row.id))),
  };
}

/** The frozen samples: those of the signals named, or all. */
async function loadKnownGood(row: KnownGoodRecord, only?: number): Promise<CaptureInput> {
  const rows = await db()
    .select()
    .from(knownGoodSignal)
    .where(eq(knownGoodSignal.knownGoodId, row.id))
    .orderBy(asc(knownGoodSignal.index));
  const signals: SignalInput[] = [];
  for (const { index, name, circuit, unit, factor, offset } of rows) {
    if (only !== undefined && only !== index) continue;
    const samples = asFloat32(await getBytes(knownGoodSamplesKey(row.id, index)));
    signals.push({ index, name, circuit, unit, factor, offset, samples });
  }
  return { axis: await loadAxis(row), signals, cylinders: row.cylinders };
}

/** One signal of a known-good, by the index it had in its capture. @throws ApiError not_found. */
export async function sideOfKnownGood(row: KnownGoodRecord, signal: number): Promise<Side> {
  const findings = await currentFindings(
    { engine: row.engineVersion, findings: row.findings },
    ENGINE_VERSION,
    () => loadKnownGood(row),
  );
  const side = sideOf(await loadKnownGood(row, signal), signal, findings);
  if (!side) throw new ApiError('not_found');
  return side;
}
