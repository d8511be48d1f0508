import { eq } from 'drizzle-orm';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { person } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { auditedBy, recordAudit } from './audit.ts';
import { endMembership, lockOwners } from './end-membership.ts';

/** Takes somebody out of the current workshop. */
export const removePerson = (caller: PersonCaller, personId: string, address: string): Promise<void> =>
  db().transaction(async (tx) => {
    // The caller's own role is looked at again under the lock: it may have been taken away meanwhile.
    const owners = await lockOwners(tx, caller.workshopId);
    if (!owners.includes(caller.personId)) throw new ApiError('role_too_low');
    await endMembership(tx, caller.workshopId, personId);
    const [gone] = await tx.select({ name: person.name }).from(person).where(eq(person.id, personId));
    const entry = { ...auditedBy(caller, caller.workshopId, address), subject: gone?.name ?? '' };
    await recordAudit({ ...entry, action: 'person removed' }, tx);
  });
