import { and, eq, gt, sql } from 'drizzle-orm';
import type { Executor } from '../db/client.ts';
import { mailedLink } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { hashSecret } from '../ids.ts';

/** Uses up the link of this secret, in the transaction of what it does. @throws ApiError when it was used or has ended. */
export async function takeMailedLink(tx: Executor, kind: 'password' | 'email', secret: string) {
  const [link] = await tx
    .delete(mailedLink)
    .where(
      and(
        eq(mailedLink.id, hashSecret(secret)),
        eq(mailedLink.kind, kind),
        gt(mailedLink.expiresAt, sql`now()`),
      ),
    )
    .returning();
  if (link !== undefined) return link;
  throw new ApiError('link_ended', {
    message: 'This link was used before, or its time is over. Nothing was changed.',
    hint: 'Ask for a new one.',
  });
}
