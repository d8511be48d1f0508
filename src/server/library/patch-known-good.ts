import { and, eq, inArray, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { libraryEndpoints } from '../../contract/areas/library.ts';
import type { KnownGoodRecord } from '../access.ts';
import { db } from '../db/client.ts';
import { knownGood } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

type Patch = z.infer<(typeof libraryEndpoints)['knownGoods.patch']['body']>;

/**
 * Changes the words of a proposal that is not published; a returned one is proposed again by it. The stretch stays: another
 * stretch is another proposal.
 */
export async function patchKnownGood(row: KnownGoodRecord, patch: Patch): Promise<KnownGoodRecord> {
  if (patch.from !== undefined || patch.to !== undefined)
    throw new ApiError('conflict', {
      message: 'The stretch is frozen. Propose the other stretch from its capture.',
    });
  const { engine, condition, note, provenance, instrument, probe, confirmed } = patch;
  const [changed] = await db()
    .update(knownGood)
    .set({
      ...(engine ?? {}),
      ...(condition === undefined ? {} : { condition }),
      ...(note === undefined ? {} : { note }),
      ...(provenance === undefined ? {} : { provenance }),
      ...(instrument === undefined ? {} : { instrument }),
      ...(probe === undefined ? {} : { probe }),
      ...(confirmed === undefined ? {} : { confirmed }),
      state: 'proposed',
      edition: sql`${knownGood.edition} + 1`,
    })
    .where(
      and(
        eq(knownGood.id, row.id),
        eq(knownGood.edition, row.edition),
        inArray(knownGood.state, ['proposed', 'returned']),
      ),
    )
    .returning();
  if (changed) return changed;
  if (row.state !== 'proposed' && row.state !== 'returned')
    throw new ApiError('conflict', {
      message: 'A published known-good is frozen. Propose a new version of it from a capture.',
    });
  throw new ApiError('stale');
}
