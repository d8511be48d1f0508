import { and, eq, isNull, sql } from 'drizzle-orm';
import type { PersonCaller } from '../../access.ts';
import { config } from '../../config.ts';
import { db } from '../../db/client.ts';
import { capture, upload } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { newId } from '../../ids.ts';

/** One person's uploads under way: this many, and this many bytes in all. */
const MOST_OPEN = 40;
const MOST_OPEN_BYTES = 16 * 1024 ** 3;

/**
 * The row of an upload that begins. Whatever lies in the store under its id is known to the sweep from here on. `length` is
 * what was announced (0 when nothing was).
 */
export async function beginUpload(
  caller: Pick<PersonCaller, 'personId' | 'workshopId'>,
  length: number,
  metadata: Readonly<Record<string, string | null>>,
): Promise<string> {
  const [open] = await db()
    .select({
      count: sql<number>`count(*)::int`,
      bytes: sql<number>`coalesce(sum(${upload.length}), 0)::float8`,
    })
    .from(upload)
    .where(
      and(
        eq(upload.personId, caller.personId),
        isNull(upload.finishedAt),
        sql`${upload.createdAt} > now() - interval '7 days'`,
      ),
    );
  if (open !== undefined && (open.count >= MOST_OPEN || open.bytes + length > MOST_OPEN_BYTES)) {
    throw new ApiError('too_many', {
      message: 'You have too many uploads under way. Finish or give up some of them first.',
      retryAfterS: 60,
    });
  }
  await refuseOverLimit(caller.workshopId, length);
  const id = newId();
  await db()
    .insert(upload)
    .values({
      id,
      workshopId: caller.workshopId,
      personId: caller.personId,
      length,
      metadata: { ...metadata },
    });
  return id;
}

/** Where a limit is set: the originals that are kept and this one together. */
async function refuseOverLimit(workshopId: string, length: number): Promise<void> {
  const limit = config().workshopLimitBytes;
  if (limit === null) return;
  const [kept] = await db()
    .select({ bytes: sql<number>`coalesce(sum(${capture.bytes}), 0)::float8` })
    .from(capture)
    .where(eq(capture.workshopId, workshopId));
  if ((kept?.bytes ?? 0) + length <= limit) return;
  throw new ApiError('too_large', {
    message:
      'The workshop has used up the room that is set for its originals. Nothing was kept of this upload.',
    hint: 'Delete captures that are no longer needed (their room is free after 30 days), or ask whoever runs this server.',
  });
}
