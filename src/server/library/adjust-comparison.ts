import { and, eq, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { libraryEndpoints } from '../../contract/areas/library.ts';
import type { ComparisonRecord } from '../access.ts';
import { comparison } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { QUEUES } from '../queue/names.ts';
import { inTransaction } from '../queue/transaction.ts';

type Patch = z.infer<(typeof libraryEndpoints)['comparisons.patch']['body']>;

/**
 * Keeps what a person set by hand and queues the drawing anew; the table's rows stay as they were.
 * @throws ApiError conflict (a shift without its axis), stale.
 */
export async function adjustComparison(row: ComparisonRecord, patch: Patch): Promise<ComparisonRecord> {
  const adjustment = {
    shift: null,
    axis: null,
    sprocketTeeth: null,
    ...row.adjustment,
    ...patch,
  };
  if (adjustment.shift !== null && adjustment.axis === null)
    throw new ApiError('invalid', {
      details: [{ path: 'axis', message: 'say in which unit the shift is: deg or s' }],
    });
  return inTransaction(async ({ tx, send }) => {
    const [changed] = await tx
      .update(comparison)
      .set({ adjustment, status: 'queued', edition: sql`${comparison.edition} + 1` })
      .where(and(eq(comparison.id, row.id), eq(comparison.edition, row.edition)))
      .returning();
    if (!changed) throw new ApiError('stale');
    await send(QUEUES.compare, { comparisonId: row.id });
    return changed;
  });
}
