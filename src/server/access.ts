import { and, eq, isNull, or, type SQL, sql } from 'drizzle-orm';
import { id } from '../contract/areas/common.ts';
import type { Thing } from '../contract/endpoint.ts';
import { ENDPOINTS, type EndpointId } from '../contract/endpoints.ts';
import { ACCESS, type AccessRow, type Grant, type Role, type Scope } from '../contract/roles.ts';
import { db } from './db/client.ts';
import { answer, capture, comparison, knownGood, mark, membership, shareLink } from './db/schema.ts';
import { ApiError } from './errors.ts';

/** Who is asking. Roles are looked up anew for every request, so a change takes effect at once. */
export type Caller = PersonCaller | ShareCaller | { readonly kind: 'nobody' };

export interface PersonCaller {
  readonly kind: 'person';
  readonly personId: string;
  readonly name: string;
  /** The current workshop of a session, or the only workshop of a token. */
  readonly workshopId: string;
  /** The role held in that workshop. */
  readonly role: Role;
  readonly via: 'session' | 'token';
  readonly sessionId?: string;
  readonly tokenId?: string;
  /** Empty for sessions, which are not limited by scope. */
  readonly scopes: readonly Scope[];
}

/** The holder of a share link that has neither ended nor been withdrawn. */
export interface ShareCaller {
  readonly kind: 'share';
  readonly linkId: string;
  readonly captureId: string;
  readonly mayAnswer: boolean;
  readonly question: string;
  readonly sharedBy: string;
  readonly expiresAt: Date;
}

export const NOBODY: Caller = { kind: 'nobody' };

export type CaptureRecord = typeof capture.$inferSelect;
export type MarkRecord = typeof mark.$inferSelect;
export type ShareLinkRecord = typeof shareLink.$inferSelect;
export type AnswerRecord = typeof answer.$inferSelect;
export type KnownGoodRecord = typeof knownGood.$inferSelect;
export type ComparisonRecord = typeof comparison.$inferSelect;

/** The row of the access table for an endpoint. */
export const accessOf = (endpoint: EndpointId): AccessRow => ACCESS[ENDPOINTS[endpoint].access];

/** Things hidden longer than this are gone. */
const RESTORABLE = sql`now() - interval '30 days'`;

/**
 * Whether the caller may use the endpoint (by id) or the page (by its row). Denies by default: nobody 401, role or scope too
 * low 403. Where the endpoint opens a thing, the role that counts is the one held in that thing's workshop: then this checks
 * kind and scope only, and `open…` checks the role.
 */
export function authorize(endpointOrRow: EndpointId | AccessRow, caller: Caller): void {
  const endpoint = typeof endpointOrRow === 'string' ? endpointOrRow : undefined;
  const row = typeof endpointOrRow === 'string' ? accessOf(endpointOrRow) : endpointOrRow;
  if (row.nobody) return;
  switch (caller.kind) {
    case 'person': {
      if (caller.via === 'token' && (row.scope === 'none' || !caller.scopes.includes(row.scope)))
        throw new ApiError('scope_too_low');
      const opensThing = endpoint !== undefined && 'opens' in ENDPOINTS[endpoint];
      if (!opensThing && row[caller.role] === 'no') throw new ApiError('role_too_low');
      return;
    }
    case 'share':
      if (row.share === 'no') throw new ApiError('not_signed_in');
      if (row.share === 'answer' && !caller.mayAnswer) {
        throw new ApiError('role_too_low', {
          message: 'This link is for looking only; it takes no answers.',
        });
      }
      return;
    case 'nobody':
      throw new ApiError('not_signed_in');
  }
}

/** The person, where an endpoint is for people only. */
export function personOf(caller: Caller): PersonCaller {
  if (caller.kind !== 'person') throw new ApiError('not_signed_in');
  return caller;
}

/** The link's holder, where an endpoint is for those only. */
export function shareOf(caller: Caller): ShareCaller {
  if (caller.kind !== 'share') throw new ApiError('not_found');
  return caller;
}

/**
 * The condition under which a person sees a capture, given the role held in its workshop (a value, or the membership's
 * column): practice captures are for their maker, instructors and owners; learners see nothing else.
 */
export function captureVisible(personId: string, role: Role | typeof membership.role): SQL {
  const own = eq(capture.createdBy, personId);
  const held = typeof role === 'string' ? sql`${role}::text` : sql`${role}`;
  return sql`(${held} in ('owner', 'instructor')
    or (${held} = 'technician' and (not ${capture.practice} or ${own}))
    or (${held} = 'learner' and ${capture.practice} and ${own}))`;
}

/** Membership in the thing's workshop: any of a session's person, the token's only for tokens. */
function memberOf(
  person: PersonCaller,
  workshopId: typeof capture.workshopId | typeof knownGood.workshopId | typeof comparison.workshopId,
) {
  return and(
    eq(membership.workshopId, workshopId),
    eq(membership.personId, person.personId),
    person.via === 'token' ? eq(membership.workshopId, person.workshopId) : undefined,
  );
}

/** Role too low in the right workshop is 403; `own` also needs the caller to be the maker. */
function grantOrThrow(grant: Grant, isOwn: boolean): void {
  if (grant === 'yes' || (grant === 'own' && isOwn)) return;
  throw new ApiError('role_too_low');
}

const notThere = () => new ApiError('not_found');

/** What cannot be an id names nothing; it does not reach the database. */
function checkId(thingId: string): void {
  if (!id.safeParse(thingId).success) throw notThere();
}

interface OpenOptions {
  /** Hidden ones too, while they can still be brought back. */
  readonly deleted?: boolean;
}

const reachable = (column: typeof capture.deletedAt | typeof mark.deletedAt, deleted = false) =>
  deleted ? or(isNull(column), sql`${column} > ${RESTORABLE}`) : isNull(column);

/** Opens a capture for an endpoint, or says 401, 403 or 404. A share link opens its own capture only. */
export async function openCapture(
  caller: Caller,
  endpoint: EndpointId,
  captureId: string,
  options: OpenOptions = {},
): Promise<CaptureRecord> {
  authorize(endpoint, caller);
  checkId(captureId);
  const row = accessOf(endpoint);
  if (caller.kind === 'share') {
    if (captureId !== caller.captureId) throw notThere();
    const [found] = await db()
      .select()
      .from(capture)
      .where(and(eq(capture.id, captureId), isNull(capture.deletedAt)));
    if (found === undefined) throw notThere();
    return found;
  }
  const person = personOf(caller);
  const [found] = await db()
    .select({ thing: capture, role: membership.role })
    .from(capture)
    .innerJoin(membership, memberOf(person, capture.workshopId))
    .where(
      and(
        eq(capture.id, captureId),
        reachable(capture.deletedAt, options.deleted),
        captureVisible(person.personId, membership.role),
      ),
    );
  if (found === undefined) throw notThere();
  grantOrThrow(row[found.role], found.thing.createdBy === person.personId);
  return found.thing;
}

/** Opens a mark through its capture. */
export async function openMark(
  caller: Caller,
  endpoint: EndpointId,
  markId: string,
  options: OpenOptions = {},
): Promise<MarkRecord> {
  authorize(endpoint, caller);
  checkId(markId);
  const person = personOf(caller);
  const [found] = await db()
    .select({ thing: mark, role: membership.role, owner: capture.createdBy })
    .from(mark)
    .innerJoin(capture, eq(capture.id, mark.captureId))
    .innerJoin(membership, memberOf(person, capture.workshopId))
    .where(
      and(
        eq(mark.id, markId),
        reachable(mark.deletedAt, options.deleted),
        isNull(capture.deletedAt),
        captureVisible(person.personId, membership.role),
      ),
    );
  if (found === undefined) throw notThere();
  grantOrThrow(accessOf(endpoint)[found.role], found.owner === person.personId);
  return found.thing;
}

/** Opens a share link through its capture. */
export async function openShareLink(
  caller: Caller,
  endpoint: EndpointId,
  linkId: string,
): Promise<ShareLinkRecord> {
  authorize(endpoint, caller);
  checkId(linkId);
  const person = personOf(caller);
  const [found] = await db()
    .select({ thing: shareLink, role: membership.role, owner: capture.createdBy })
    .from(shareLink)
    .innerJoin(capture, eq(capture.id, shareLink.captureId))
    .innerJoin(membership, memberOf(person, capture.workshopId))
    .where(
      and(
        eq(shareLink.id, linkId),
        isNull(capture.deletedAt),
        captureVisible(person.personId, membership.role),
      ),
    );
  if (found === undefined) throw notThere();
  grantOrThrow(accessOf(endpoint)[found.role], found.owner === person.personId);
  return found.thing;
}

/** Opens an answer through its capture. */
export async function openAnswer(
  caller: Caller,
  endpoint: EndpointId,
  answerId: string,
): Promise<AnswerRecord> {
  authorize(endpoint, caller);
  checkId(answerId);
  const person = personOf(caller);
  const [found] = await db()
    .select({ thing: answer, role: membership.role, owner: capture.createdBy })
    .from(answer)
    .innerJoin(capture, eq(capture.id, answer.captureId))
    .innerJoin(membership, memberOf(person, capture.workshopId))
    .where(
      and(
        eq(answer.id, answerId),
        isNull(capture.deletedAt),
        captureVisible(person.personId, membership.role),
      ),
    );
  if (found === undefined) throw notThere();
  grantOrThrow(accessOf(endpoint)[found.role], found.owner === person.personId);
  return found.thing;
}

/** Opens a known-good of a workshop that the person belongs to. */
export async function openKnownGood(
  caller: Caller,
  endpoint: EndpointId,
  knownGoodId: string,
): Promise<KnownGoodRecord> {
  authorize(endpoint, caller);
  checkId(knownGoodId);
  const person = personOf(caller);
  const [found] = await db()
    .select({ thing: knownGood, role: membership.role })
    .from(knownGood)
    .innerJoin(membership, memberOf(person, knownGood.workshopId))
    .where(eq(knownGood.id, knownGoodId));
  if (found === undefined) throw notThere();
  grantOrThrow(accessOf(endpoint)[found.role], found.thing.createdBy === person.personId);
  return found.thing;
}

/** Opens a comparison, which is seen by whoever sees its capture. */
export async function openComparison(
  caller: Caller,
  endpoint: EndpointId,
  comparisonId: string,
): Promise<ComparisonRecord> {
  authorize(endpoint, caller);
  checkId(comparisonId);
  const person = personOf(caller);
  const [found] = await db()
    .select({ thing: comparison, role: membership.role })
    .from(comparison)
    .innerJoin(capture, eq(capture.id, comparison.captureId))
    .innerJoin(membership, memberOf(person, comparison.workshopId))
    .where(
      and(
        eq(comparison.id, comparisonId),
        isNull(capture.deletedAt),
        captureVisible(person.personId, membership.role),
      ),
    );
  if (found === undefined) throw notThere();
  grantOrThrow(accessOf(endpoint)[found.role], found.thing.createdBy === person.personId);
  return found.thing;
}

/** What each kind of thing opens as. */
export interface Opened {
  readonly capture: CaptureRecord;
  readonly mark: MarkRecord;
  readonly shareLink: ShareLinkRecord;
  readonly answer: AnswerRecord;
  readonly knownGood: KnownGoodRecord;
  readonly comparison: ComparisonRecord;
}

type Opener<T extends Thing> = (
  caller: Caller,
  endpoint: EndpointId,
  thingId: string,
  options?: OpenOptions,
) => Promise<Opened[T]>;

/** The door for each kind of thing. */
export const OPENERS: { readonly [T in Thing]: Opener<T> } = {
  capture: openCapture,
  mark: openMark,
  shareLink: openShareLink,
  answer: openAnswer,
  knownGood: openKnownGood,
  comparison: openComparison,
};
