import { and, desc, eq, gt, ne, sql } from 'drizzle-orm';
import type { SessionJson } from '../../contract/areas/people.ts';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { session } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

/** What names a session outside: the first half of its hash, which opens nothing. */
const publicId = sql<string>`left(${session.id}, 32)`;

/** Where the person is signed in, newest first. */
export async function listSessions(caller: PersonCaller): Promise<SessionJson[]> {
  const rows = await db()
    .select({
      id: publicId,
      whole: session.id,
      createdAt: session.createdAt,
      address: session.address,
      agent: session.agent,
    })
    .from(session)
    .where(and(eq(session.userId, caller.personId), gt(session.expiresAt, sql`now()`)))
    .orderBy(desc(session.createdAt))
    .limit(200);
  return rows.map(({ whole, createdAt, ...row }) => ({
    ...row,
    current: whole === caller.sessionId,
    startedAt: createdAt.toISOString(),
  }));
}

/** Ends one of the person's own sessions. */
export async function endOwnSession(caller: PersonCaller, id: string): Promise<void> {
  const ended = await db()
    .delete(session)
    .where(and(eq(session.userId, caller.personId), eq(publicId, id)))
    .returning({ id: session.id });
  if (ended.length === 0) throw new ApiError('not_found');
}

/** Ends all of the person's sessions but the one that asks. */
export async function endOtherSessions(caller: PersonCaller): Promise<void> {
  await db()
    .delete(session)
    .where(and(eq(session.userId, caller.personId), ne(session.id, caller.sessionId ?? '')));
}
