import { and, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { KnownGoodRecord, PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { knownGood, knownGoodReview } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { newId } from '../ids.ts';
import { bumpShapes } from './bump-shapes.ts';

type Decision = 'publish' | 'return' | 'retire';

/** From which states a decision leads where. */
const STEPS = {
  publish: { from: ['proposed'], to: 'published' },
  return: { from: ['proposed'], to: 'returned' },
  retire: { from: ['published'], to: 'retired' },
} as const;

/**
 * Publishes, returns or retires. Never by the author; of two reviewers at once the second is told (412), since the state
 * and the edition are in the WHERE.
 */
export async function reviewKnownGood(
  caller: PersonCaller,
  row: KnownGoodRecord,
  review: { readonly decision: Decision; readonly note: string },
): Promise<KnownGoodRecord> {
  if (row.createdBy === caller.personId) throw new ApiError('own_review');
  const step = STEPS[review.decision];
  if (!(step.from as readonly string[]).includes(row.state))
    throw new ApiError('conflict', {
      message: `It is ${row.state} already; that cannot be done from there.`,
    });
  return db().transaction(async (tx) => {
    const [changed] = await tx
      .update(knownGood)
      .set({
        state: step.to,
        edition: sql`${knownGood.edition} + 1`,
        ...(review.decision === 'publish' ? { publishedAt: new Date() } : {}),
      })
      .where(
        and(eq(knownGood.id, row.id), eq(knownGood.edition, row.edition), eq(knownGood.state, row.state)),
      )
      .returning();
    if (!changed) throw new ApiError('stale');
    if (review.decision === 'publish' && row.supersedes !== null) await takePlace(tx, row.supersedes, row.id);
    if (review.decision !== 'return') await bumpShapes(tx, row.workshopId);
    await tx.insert(knownGoodReview).values({
      id: newId(),
      knownGoodId: row.id,
      reviewerId: caller.personId,
      decision: review.decision,
      note: review.note,
    });
    return changed;
  });
}

type Transaction = Parameters<Parameters<ReturnType<typeof db>['transaction']>[0]>[0];

/** The older version stays readable and whole, but is offered for no further comparison. Only one may take its place. */
async function takePlace(tx: Transaction, olderId: string, newerId: string): Promise<void> {
  const replaced = await tx
    .update(knownGood)
    .set({ state: 'superseded', supersededBy: newerId, edition: sql`${knownGood.edition} + 1` })
    .where(
      and(
        eq(knownGood.id, olderId),
        isNull(knownGood.supersededBy),
        inArray(knownGood.state, ['published', 'retired']),
      ),
    )
    .returning({ id: knownGood.id });
  if (replaced.length === 0)
    throw new ApiError('conflict', {
      message: 'Another version has taken the place of the older one already. Return this one to its author.',
    });
}
