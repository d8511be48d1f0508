import { asc, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { windowQuery } from '../../../contract/areas/captures.ts';
import type { CaptureRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { captureSignal } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { BoundedCache } from './bounded-cache.ts';
import { type BuiltWindow, buildWindow } from './build-window.ts';
import { storeSource } from './store-source.ts';

/** Windows made before, whole: most are asked for again by somebody who looks at the same capture. */
const windows = new BoundedCache<BuiltWindow>(24 * 1024 * 1024);
/** Windows that are being made: who asks for the same one meanwhile gets it too. */
const making = new Map<string, Promise<BuiltWindow>>();
/** Signal indices by capture and samples version, which they never change under. */
const indices = new BoundedCache<readonly number[]>(256 * 1024);
/** A window's place in the cache costs this much besides its body. */
const OVERHEAD_BYTES = 1024;

/** A window of a capture that the caller may see. Asking with an older samples version is 409. */
export async function captureWindow(
  row: Pick<CaptureRecord, 'id' | 'samplesVersion' | 'axis'>,
  query: z.output<typeof windowQuery>,
): Promise<BuiltWindow> {
  if (row.axis === null || row.samplesVersion === 0) {
    throw new ApiError('not_ready', {
      message: 'The capture is not read yet; there are no samples to show.',
    });
  }
  if (query.v !== undefined && query.v !== row.samplesVersion) throw new ApiError('samples_changed');
  const { from, to, columns } = query;
  const key = `${row.id}/${row.samplesVersion}/${from}/${to}/${columns}/${query.signals?.join() ?? 'all'}`;
  const known = windows.get(key) ?? making.get(key);
  if (known !== undefined) return known;
  const made = make(row, { from, to, columns }, query.signals).finally(() => making.delete(key));
  making.set(key, made);
  const window = await made;
  windows.set(key, window, window.body.length + OVERHEAD_BYTES);
  return window;
}

async function make(
  row: Pick<CaptureRecord, 'id' | 'samplesVersion' | 'axis'>,
  stretch: { readonly from: number; readonly to: number; readonly columns: number },
  wanted: readonly number[] | undefined,
): Promise<BuiltWindow> {
  const name = `${row.id}/${row.samplesVersion}`;
  const all = indices.get(name) ?? (await signalIndices(row.id));
  indices.set(name, all, name.length * 2 + all.length * 8);
  const signals = wanted ?? all.slice(0, 64);
  const unknown = signals.find((signal) => !all.includes(signal));
  if (unknown !== undefined) {
    throw new ApiError('invalid', {
      details: [{ path: 'signals', message: `there is no signal ${unknown}` }],
    });
  }
  const { headers, body } = await buildWindow(storeSource(row), { ...stretch, signals });
  return { headers: { ...headers, 'Gapmark-Samples-Version': String(row.samplesVersion) }, body };
}

async function signalIndices(captureId: string): Promise<number[]> {
  const rows = await db()
    .select({ index: captureSignal.index })
    .from(captureSignal)
    .where(eq(captureSignal.captureId, captureId))
    .orderBy(asc(captureSignal.index));
  return rows.map(({ index }) => index);
}
