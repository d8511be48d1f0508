import type { z } from 'zod';
import type { CaptureJson, capturePatch } from '../../contract/areas/captures.ts';
import { type ApiAnswer, ApiFailure, api } from '../base/api.ts';

export type CapturePatch = z.input<typeof capturePatch>;

/**
 * Changes a capture as it was seen. When somebody else (or the worker) changed it in between, looks again and tries once more:
 * the fields sent are only those that this person touched.
 */
export async function changeCapture(
  seen: ApiAnswer<CaptureJson>,
  patch: CapturePatch,
): Promise<ApiAnswer<CaptureJson>> {
  const path = `/captures/${seen.data.id}`;
  try {
    return await api<CaptureJson>(path, { method: 'PATCH', body: patch, etag: seen.etag });
  } catch (thrown) {
    if (!(thrown instanceof ApiFailure) || thrown.status !== 412) throw thrown;
    const { etag } = await api<CaptureJson>(path);
    return api<CaptureJson>(path, { method: 'PATCH', body: patch, etag });
  }
}
