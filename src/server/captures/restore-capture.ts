import { eq, sql } from 'drizzle-orm';
import type { CaptureRecord } from '../access.ts';
import { db } from '../db/client.ts';
import { capture } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

/** Brings a hidden capture back; one that is not hidden stays as it is. */
export async function restoreCapture(row: CaptureRecord): Promise<CaptureRecord> {
  if (row.deletedAt === null) return row;
  const [back] = await db()
    .update(capture)
    .set({ deletedAt: null, edition: sql`${capture.edition} + 1` })
    .where(eq(capture.id, row.id))
    .returning();
  if (back === undefined) throw new ApiError('not_found');
  return back;
}
