import { and, asc, eq, isNull } from 'drizzle-orm';
import type { MarkRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { mark } from '../../db/schema.ts';
import { MARKS_LIMIT } from './create-mark.ts';

/** All marks of a capture that were not taken away, in order of time; a capture has a bounded number. */
export const listMarks = (captureId: string): Promise<MarkRecord[]> =>
  db()
    .select()
    .from(mark)
    .where(and(eq(mark.captureId, captureId), isNull(mark.deletedAt)))
    .orderBy(asc(mark.fromS), asc(mark.createdAt), asc(mark.id))
    .limit(MARKS_LIMIT);
