import { and, eq, exists, gt, isNull, sql } from 'drizzle-orm';
import { accessOf, type CaptureRecord, captureVisible, type PersonCaller } from '../../access.ts';
import { type Database, db } from '../../db/client.ts';
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
  const [found] = await statementFor(caller.via).execute({
    captureId,
    personId: caller.personId,
    workshopId: caller.workshopId,
    credentialId: (caller.via === 'token' ? caller.tokenId : caller.sessionId) ?? '',
  });
  if (found === undefined) return null;
  const grant = access[found.role];
  const own = found.createdBy === caller.personId;
  // As in the capture's door: what a learner finds and did not make is set for them.
  const granted = grant === 'yes' || grant === 'set' || (grant === 'own' && own);
  return granted ? found : null;
}

const statements = new WeakMap<Database, Map<PersonCaller['via'], ReturnType<typeof prepare>>>();

/** Built once a process and kept by the database a connection: building and planning cost more than the look-up itself. */
function statementFor(via: PersonCaller['via']) {
  const database = db();
  const made = statements.get(database) ?? new Map<PersonCaller['via'], ReturnType<typeof prepare>>();
  statements.set(database, made);
  const statement = made.get(via) ?? prepare(database, via);
  made.set(via, statement);
  return statement;
}

function prepare(database: Database, via: PersonCaller['via']) {
  const personId = sql.placeholder('personId');
  const credential = sql.placeholder('credentialId');
  const one = { one: sql`1` };
  const now = sql`now()`;
  const stands =
    via === 'token'
      ? database
          .select(one)
          .from(token)
          .where(and(eq(token.id, credential), gt(token.expiresAt, now)))
      : database
          .select(one)
          .from(session)
          .where(and(eq(session.id, credential), gt(session.expiresAt, now)));
  return database
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
        eq(membership.personId, personId),
        via === 'token' ? eq(membership.workshopId, sql.placeholder('workshopId')) : undefined,
      ),
    )
    .where(
      and(
        eq(capture.id, sql.placeholder('captureId')),
        isNull(capture.deletedAt),
        captureVisible(personId, membership.role),
        exists(stands),
      ),
    )
    .prepare(`window_door_${via}`);
}
