import type { Scope } from '../../contract/roles.ts';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { token } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { hashSecret, newId, newSecret } from '../ids.ts';
import { auditedBy, recordAudit } from '../workshop/audit.ts';

const DAY_MS = 86_400_000;
const DEFAULT_DAYS = 90;
const LONGEST_DAYS = 366;

interface TokenRequest {
  readonly name: string;
  readonly scopes: readonly Scope[];
  readonly expiresAt?: string | undefined;
}

/** The end of a token: 90 days from now unless said, at most a year. */
export function tokenEnd(expiresAt: string | undefined, now = Date.now()): Date {
  const end = expiresAt === undefined ? now + DEFAULT_DAYS * DAY_MS : Date.parse(expiresAt);
  if (end <= now || end > now + LONGEST_DAYS * DAY_MS) {
    throw new ApiError('invalid', {
      details: [{ path: 'expiresAt', message: 'lies in the future, at most a year from now' }],
    });
  }
  return new Date(end);
}

/** Makes a token for the person's current workshop. Its secret is in this answer and nowhere else. */
export async function createToken(
  caller: PersonCaller,
  request: TokenRequest,
  address: string,
): Promise<{ id: string; token: string; expiresAt: string }> {
  const expiresAt = tokenEnd(request.expiresAt);
  const id = newId();
  const secret = `gapmark_${newSecret()}`;
  await db().transaction(async (tx) => {
    await tx.insert(token).values({
      id,
      personId: caller.personId,
      workshopId: caller.workshopId,
      name: request.name,
      hash: hashSecret(secret),
      scopes: [...new Set(request.scopes)],
      expiresAt,
    });
    await recordAudit(
      { ...auditedBy(caller, caller.workshopId, address), action: 'token made', subject: request.name },
      tx,
    );
  });
  return { id, token: secret, expiresAt: expiresAt.toISOString() };
}
