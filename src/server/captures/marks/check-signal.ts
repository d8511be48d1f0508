import { and, eq } from 'drizzle-orm';
import type { Executor } from '../../db/client.ts';
import { captureSignal } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

/** 422 when a mark names a signal that its capture has not. */
export async function checkSignal(
  on: Executor,
  captureId: string,
  signal: number | null,
  path: string,
): Promise<void> {
  if (signal === null) return;
  const [found] = await on
    .select({ index: captureSignal.index })
    .from(captureSignal)
    .where(and(eq(captureSignal.captureId, captureId), eq(captureSignal.index, signal)));
  if (found === undefined) {
    throw new ApiError('invalid', { details: [{ path, message: 'is not a signal of this capture' }] });
  }
}
