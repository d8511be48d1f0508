import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { auditedBy, recordAudit } from './audit.ts';
import { endMembership } from './end-membership.ts';

/** Leaves the current workshop. */
export const leaveWorkshop = (caller: PersonCaller, address: string): Promise<void> =>
  db().transaction(async (tx) => {
    await endMembership(tx, caller.workshopId, caller.personId);
    const entry = {
      ...auditedBy(caller, caller.workshopId, address),
      action: 'left the workshop',
      subject: '',
    };
    await recordAudit(entry, tx);
  });
