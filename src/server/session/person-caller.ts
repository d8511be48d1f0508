import { and, asc, eq, gt, isNull, lt, or, sql } from 'drizzle-orm';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { membership, person, token } from '../db/schema.ts';
import { hashSecret } from '../ids.ts';
import { lucia } from './lucia.ts';

/** The person whom a session's cookie names, in their current workshop, with the role held there now. */
export async function callerOfSession(secret: string): Promise<PersonCaller | null> {
  const { user, session } = await lucia().validateSession(hashSecret(secret));
  if (user === null) return null;
  // A membership that ended falls back to another one of theirs.
  const [held] = await db()
    .select({ workshopId: membership.workshopId, role: membership.role })
    .from(membership)
    .where(eq(membership.personId, user.id))
    .orderBy(
      sql`${membership.workshopId} is distinct from ${user.currentWorkshopId}`,
      asc(membership.createdAt),
    )
    .limit(1);
  if (held === undefined) return null;
  return {
    kind: 'person',
    personId: user.id,
    name: user.name,
    ...held,
    via: 'session',
    sessionId: session.id,
    scopes: [],
  };
}

/** The person whom a token names, in the token's workshop only, with the role held there now. */
export async function callerOfToken(secret: string): Promise<PersonCaller | null> {
  const [found] = await db()
    .select({
      tokenId: token.id,
      scopes: token.scopes,
      personId: person.id,
      name: person.name,
      workshopId: token.workshopId,
      role: membership.role,
    })
    .from(token)
    .innerJoin(person, eq(person.id, token.personId))
    .innerJoin(
      membership,
      and(eq(membership.personId, token.personId), eq(membership.workshopId, token.workshopId)),
    )
    .where(and(eq(token.hash, hashSecret(secret)), gt(token.expiresAt, sql`now()`)));
  if (found === undefined) return null;
  noteUse(found.tokenId);
  return { kind: 'person', via: 'token', ...found };
}

/** Minutes suffice for "last used"; it must not hold up the request nor fail it. */
function noteUse(tokenId: string): void {
  void db()
    .update(token)
    .set({ lastUsedAt: sql`now()` })
    .where(
      and(
        eq(token.id, tokenId),
        or(isNull(token.lastUsedAt), lt(token.lastUsedAt, sql`now() - interval '1 minute'`)),
      ),
    )
    .catch(() => {});
}
