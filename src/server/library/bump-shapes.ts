import { sql } from 'drizzle-orm';
import type { db } from '../db/client.ts';
import { shapeEdition } from '../db/schema.ts';

type Transaction = Parameters<Parameters<ReturnType<typeof db>['transaction']>[0]>[0];

/** Says that a workshop's published shapes changed; in the transaction that changes them. */
export async function bumpShapes(tx: Transaction, workshopId: string): Promise<void> {
  await tx
    .insert(shapeEdition)
    .values({ workshopId })
    .onConflictDoUpdate({
      target: shapeEdition.workshopId,
      set: { edition: sql`${shapeEdition.edition} + 1` },
    });
}
