import { and, eq, exists, gt, isNull, sql } from 'drizzle-orm';
import { accessOf, type CaptureRecord, captureVisible, type PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { capture, membership, session, token } from '../../db/schema.ts';

export type WindowRow = Pick<CaptureRecord, 'id' | 'samplesVersion' | 'axis'>;

/**
 * The access door for windows in one query instead of several, for a caller whom the door itself resolved a moment ago:
 * that the session or token still stands, the role held now and what it may see are asked anew. It only ever grants: null
 * means nothing but "ask the door", which then refuses in its own words.
 */
export async function quickDoor(caller: PersonCaller, captureId: string): Promise<WindowRow | null> {
  const access = accessOf('captures.window');
  if (caller.via === 'token' && !caller.scopes.some((scope) => scope === access.scope)) return null;
  const [found] = await db()
    .select({
      id: capture.id,
      samplesVersion: capture.samplesVersion,
      axis: capture.axis,
      createdBy: capture.createdBy,
      role: membership.role,
    })
    .from(capture)
    .innerJoin(
      membership,
      and(
        eq(membership.workshopId, capture.workshopId),
        eq(membership.personId, caller.personId),
        caller.via === 'token' ? eq(membership.workshopId, caller.workshopId) : undefined,
      ),
    )
    .where(
      and(
        eq(capture.id, captureId),
        isNull(capture.deletedAt),
        captureVisible(caller.personId, membership.role),
        exists(
          caller.via === 'token' ? tokenStands(caller.tokenId ?? '') : sessionStands(caller.sessionId ?? ''),
        ),
      ),
    );
  if (found === undefined) return null;
  const grant = access[found.role];
  const own = found.createdBy === caller.personId;
  // As in the capture's door: what a learner finds and did not make is set for them.
  const granted = grant === 'yes' || grant === 'set' || (grant === 'own' && own);
  return granted ? found : null;
}

const one = { one: sql`1` };

const tokenStands = (id: string) =>
  db()
    .select(one)
    .from(token)
    .where(and(eq(token.id, id), gt(token.expiresAt, sql`now()`)));

const sessionStands = (id: string) =>
  db()
    .select(one)
    .from(session)
    .where(and(eq(session.id, id), gt(session.expiresAt, sql`now()`)));
