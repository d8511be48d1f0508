import { and, count, eq, isNull, sum } from 'drizzle-orm';
import { config } from '../config.ts';
import { db } from '../db/client.ts';
import { capture, workshop } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

export interface WorkshopSummary {
  readonly id: string;
  readonly name: string;
  readonly timeZone: string;
  readonly edition: number;
  /** Bytes of the originals, hidden captures included, since they still take room. */
  readonly storageBytes: number;
  readonly captures: number;
  /** Most bytes of originals that it may keep; null: as many as the store takes. */
  readonly limitBytes: number | null;
  readonly auditDays: number;
  readonly endsAt: Date | null;
}

/** A workshop and how much it holds. */
export async function getWorkshop(workshopId: string): Promise<WorkshopSummary> {
  const [[found], [bytes], [shown]] = await Promise.all([
    db().select().from(workshop).where(eq(workshop.id, workshopId)),
    db()
      .select({ total: sum(capture.bytes) })
      .from(capture)
      .where(eq(capture.workshopId, workshopId)),
    db()
      .select({ total: count() })
      .from(capture)
      .where(and(eq(capture.workshopId, workshopId), isNull(capture.deletedAt))),
  ]);
  if (found === undefined) throw new ApiError('not_found');
  const { id, name, timeZone, edition, auditDays, endsAt } = found;
  return {
    id,
    name,
    timeZone,
    edition,
    storageBytes: Number(bytes?.total ?? 0),
    captures: shown?.total ?? 0,
    limitBytes: config().workshopLimitBytes,
    auditDays,
    endsAt,
  };
}
