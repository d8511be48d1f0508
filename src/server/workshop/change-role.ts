import { and, eq } from 'drizzle-orm';
import type { Role } from '../../contract/roles.ts';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { membership, person } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { auditedBy, recordAudit } from './audit.ts';
import { lockOwners } from './end-membership.ts';

/** Changes somebody's role in the current workshop. The last owner stays owner. */
export async function changeRole(caller: PersonCaller, personId: string, role: Role, address: string) {
  return db().transaction(async (tx) => {
    // All owners are locked, so that two who step down at once do not leave a workshop without one.
    const owners = await lockOwners(tx, caller.workshopId);
    // The caller's own role is looked at again under the lock: it may have been taken away meanwhile.
    if (!owners.includes(caller.personId)) throw new ApiError('role_too_low');
    const here = and(eq(membership.workshopId, caller.workshopId), eq(membership.personId, personId));
    const [held] = await tx.select().from(membership).where(here).for('update');
    if (held === undefined) throw new ApiError('not_found');
    if (held.role === 'owner' && role !== 'owner' && owners.length === 1) {
      throw new ApiError('conflict', {
        message: 'A workshop keeps at least one owner.',
        hint: 'Make somebody else an owner first.',
      });
    }
    await tx.update(membership).set({ role }).where(here);
    const [found] = await tx.select().from(person).where(eq(person.id, personId));
    if (found === undefined) throw new ApiError('not_found');
    await recordAudit(
      {
        ...auditedBy(caller, caller.workshopId, address),
        action: 'role changed',
        subject: `${found.name}: ${held.role} to ${role}`,
      },
      tx,
    );
    return { id: found.id, name: found.name, email: found.email, role, since: held.createdAt.toISOString() };
  });
}
