import type { Caller } from '../access.ts';
import { db, type Executor } from '../db/client.ts';
import { audit } from '../db/schema.ts';
import { newId } from '../ids.ts';

export interface AuditEntry {
  readonly workshopId: string | null;
  readonly personId: string | null;
  /** A name that stays readable when the person is gone. */
  readonly who: string;
  /** What happened, in the past tense: "link withdrawn". */
  readonly action: string;
  /** What it happened to: a title or an id, never a secret. */
  readonly subject: string;
  readonly address: string;
}

/** Adds a line to the list of what happened that matters; inside a transaction when one is given. */
export async function recordAudit(entry: AuditEntry, on: Executor = db()): Promise<void> {
  await on.insert(audit).values({ id: newId(), ...entry });
}

/** The who and where of an entry, from the caller. The workshop is the thing's, which may not be the current one. */
export function auditedBy(
  caller: Caller,
  workshopId: string,
  address = '',
): Pick<AuditEntry, 'workshopId' | 'personId' | 'who' | 'address'> {
  if (caller.kind === 'person') return { workshopId, personId: caller.personId, who: caller.name, address };
  return { workshopId, personId: null, who: caller.kind === 'share' ? 'a link’s holder' : 'nobody', address };
}
