import { createHash } from 'node:crypto';
import { and, eq, lt, sql } from 'drizzle-orm';
import type { Caller } from '../access.ts';
import { db } from '../db/client.ts';
import { idempotency } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { errorAnswer, type PlainAnswer, toApiError } from './respond.ts';

/** Kept this long. */
const KEPT = sql`now() - interval '24 hours'`;
/** A first request that has not ended by then was cut off (its process died); a repeat takes over. */
const CUT_OFF = sql`now() - interval '2 minutes'`;
const RETRY_S = 2;

export interface IdempotentRequest {
  readonly caller: Caller;
  /** Method and path without the query. */
  readonly path: string;
  readonly key: string;
  /** SHA-256 of what was sent: `hashJson`, or `hashMultipart`. */
  readonly contentHash: string;
}

/** What a run gives: an answer, and the thing's id where the answer shows a secret once. */
export interface IdempotentAnswer extends PlainAnswer {
  readonly shownOnceFor?: string;
}

const sha256 = (text: string) => createHash('sha256').update(text).digest('hex');

/** JSON with sorted keys: the same content gives the same text. */
export function canonicalJson(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(',')}]`;
  if (value !== null && typeof value === 'object') {
    const entries = Object.entries(value)
      .filter(([, item]) => item !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0));
    return `{${entries.map(([key, item]) => `${JSON.stringify(key)}:${canonicalJson(item)}`).join(',')}}`;
  }
  return JSON.stringify(value) ?? 'null';
}

export const hashJson = (body: unknown): string => sha256(canonicalJson(body));

/** Fields and each file's SHA-256, in any order of arrival. */
export const hashMultipart = (
  fields: Readonly<Record<string, string>>,
  files: Readonly<Record<string, string>>,
): string => sha256(canonicalJson({ fields, files }));

/** Whose key it is; a caller who is nobody has none. */
function ownerOf(caller: Caller): string | null {
  if (caller.kind === 'person') return `person ${caller.personId} ${caller.workshopId}`;
  return caller.kind === 'share' ? `share ${caller.linkId}` : null;
}

/** Reads the header: undefined when absent, 422 when it cannot be a key. */
export function idempotencyKey(header: string | undefined): string | undefined {
  if (header === undefined) return undefined;
  if (/^[\x21-\x7e][\x20-\x7e]{0,254}$/.test(header)) return header;
  throw new ApiError('invalid', {
    details: [{ path: 'Idempotency-Key', message: 'is 1 to 255 printable characters' }],
  });
}

/**
 * Runs a POST once for its caller, path and key. The same content gets the first answer again; other content is 409; while the
 * first still runs 409 with Retry-After. Answers of 5xx and 429 are not kept, so that a retry tries anew.
 */
export async function runIdempotent(
  request: IdempotentRequest,
  run: () => Promise<IdempotentAnswer>,
): Promise<PlainAnswer> {
  const owner = ownerOf(request.caller);
  if (owner === null) return run();
  const id = sha256(`${owner}\n${request.path}\n${request.key}`);
  const earlier = await claim(id, request.contentHash);
  if (earlier !== null) return earlier;
  let answer: IdempotentAnswer;
  try {
    answer = await run();
  } catch (thrown) {
    answer = errorAnswer(toApiError(thrown));
  }
  if (answer.status >= 500 || answer.status === 429) {
    await db()
      .delete(idempotency)
      .where(and(eq(idempotency.id, id), eq(idempotency.state, 'running')))
      .catch(() => {}); // The lease ends by itself.
    return answer;
  }
  const kept = answer.shownOnceFor === undefined ? answer : alreadyMade(answer.shownOnceFor);
  await db()
    .update(idempotency)
    .set({
      state: 'done',
      status: kept.status,
      body: { headers: keptHeaders(kept.headers), body: kept.body },
    })
    .where(eq(idempotency.id, id));
  return answer;
}

/** Takes the key for this request (null), or gives the earlier answer, or refuses. */
async function claim(id: string, contentHash: string): Promise<PlainAnswer | null> {
  const free = sql`${idempotency.createdAt} < ${KEPT} or (${idempotency.state} = 'running'
    and ${idempotency.createdAt} < ${CUT_OFF} and ${idempotency.contentHash} = ${contentHash})`;
  const [taken] = await db()
    .insert(idempotency)
    .values({ id, contentHash, state: 'running' })
    .onConflictDoUpdate({
      target: idempotency.id,
      set: { contentHash, state: 'running', status: null, body: null, createdAt: sql`now()` },
      setWhere: free,
    })
    .returning({ id: idempotency.id });
  if (taken !== undefined) {
    sweepNowAndThen();
    return null;
  }
  const [row] = await db().select().from(idempotency).where(eq(idempotency.id, id));
  if (row === undefined) throw new ApiError('still_running', { retryAfterS: RETRY_S });
  if (row.contentHash !== contentHash) throw new ApiError('key_reused');
  if (row.state === 'running' || row.status === null)
    throw new ApiError('still_running', { retryAfterS: RETRY_S });
  const kept = row.body as { headers: Record<string, string>; body: string };
  return {
    status: row.status,
    headers: { ...kept.headers, 'Idempotency-Replayed': 'true' },
    body: kept.body,
  };
}

/** Never a cookie: its secret would lie in the table. */
const keptHeaders = (headers: PlainAnswer['headers']) =>
  Object.fromEntries(
    Object.entries(headers).filter(([name]) =>
      ['content-type', 'cache-control', 'etag', 'retry-after'].includes(name.toLowerCase()),
    ),
  );

function alreadyMade(madeId: string): PlainAnswer {
  return errorAnswer(
    new ApiError('already_made', {
      hint: 'Delete it and make another if the secret was lost.',
      details: [{ path: 'id', message: madeId }],
    }),
  );
}

/** One claim in about two hundred removes what is older than a day. */
function sweepNowAndThen(): void {
  if (Math.random() < 0.005) void sweepIdempotency().catch(() => {});
}

export async function sweepIdempotency(): Promise<void> {
  await db().delete(idempotency).where(lt(idempotency.createdAt, KEPT));
}
