import { and, eq, inArray } from 'drizzle-orm';
import type { CaptureRecord } from '../../access.ts';
import { db } from '../../db/client.ts';
import { capture } from '../../db/schema.ts';
import type { ReadJob } from '../../queue/names.ts';

export interface Begun {
  readonly row: CaptureRecord;
  readonly kind: ReadJob['kind'];
}

/** Samples versions of one revision: its number times this, plus the attempt. They rise with both and never meet. */
const VERSIONS_A_REVISION = 1000;

/** The samples version that attempt number `takes` (from 1) at a revision writes under. */
export const versionFor = (revision: number, takes: number): number =>
  revision * VERSIONS_A_REVISION + Math.min(takes, VERSIONS_A_REVISION - 1);

/** Whether the samples that stand were read at this revision. */
export const isReadAt = (row: Pick<CaptureRecord, 'samplesVersion' | 'revision' | 'axis'>): boolean =>
  row.axis !== null && Math.floor(row.samplesVersion / VERSIONS_A_REVISION) === row.revision;

/**
 * Sets the capture's status to what now begins. Null when there is nothing to do any more: it was changed, stopped or
 * removed since. An attempt after one that had read everything only measures.
 */
export async function beginWork(job: ReadJob): Promise<Begun | null> {
  const [found] = await db().select().from(capture).where(eq(capture.id, job.captureId));
  if (found === undefined || found.revision !== job.revision) return null;
  const kind = job.kind === 'measure' || isReadAt(found) ? 'measure' : 'read';
  const [row] = await db()
    .update(capture)
    .set({ status: kind === 'read' ? 'reading' : 'measuring', progress: 0 })
    .where(
      and(
        eq(capture.id, job.captureId),
        eq(capture.revision, job.revision),
        inArray(capture.status, ['queued', 'reading', 'measuring']),
      ),
    )
    .returning();
  return row === undefined ? null : { row, kind };
}
