import { asc, eq } from 'drizzle-orm';
import type { CaptureInput, SignalInput, TimeAxis } from '../../engine/capture.ts';
import { db } from '../db/client.ts';
import { type capture, captureSignal, type StoredAxis } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { getBytes } from './get-bytes.ts';
import { samplesKey, timesKey } from './keys.ts';
import { asFloat32, asFloat64 } from './typed-bytes.ts';

type CaptureRow = typeof capture.$inferSelect;
type SamplesOf = Pick<CaptureRow, 'id' | 'samplesVersion' | 'axis'>;

/** The axis with, where it is uneven, its times. */
export async function loadAxis(row: SamplesOf): Promise<TimeAxis> {
  const axis: StoredAxis | null = row.axis;
  if (axis === null) throw new ApiError('not_ready');
  if (axis.kind === 'even') return axis;
  const timesS = asFloat64(await getBytes(timesKey(row.id, row.samplesVersion)));
  return { kind: 'uneven', timesS, holds: axis.holds };
}

/** One signal's samples as recorded. An empty signal has an empty array. */
export async function loadSamples(row: SamplesOf, signal: number): Promise<Float32Array> {
  return asFloat32(await getBytes(samplesKey(row.id, row.samplesVersion, signal)));
}

/**
 * What the engine takes: the axis and the samples of the signals named (all when none are). Signals that the capture does
 * not have are left out.
 */
export async function loadCaptureInput(
  row: SamplesOf & Pick<CaptureRow, 'cylinders'>,
  signalIndices?: readonly number[],
): Promise<CaptureInput> {
  const rows = await db()
    .select()
    .from(captureSignal)
    .where(eq(captureSignal.captureId, row.id))
    .orderBy(asc(captureSignal.index));
  const wanted = rows.filter((signal) => signalIndices?.includes(signal.index) ?? true);
  const axis = await loadAxis(row);
  const signals: SignalInput[] = [];
  for (const signal of wanted) {
    const { index, name, circuit, unit, factor, offset, rail } = signal;
    const samples = await loadSamples(row, index);
    signals.push({ index, name, circuit, unit, factor, offset, samples, ...(rail === null ? {} : { rail }) });
  }
  return { axis, signals, cylinders: row.cylinders };
}
