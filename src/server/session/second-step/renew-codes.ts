import type { PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { ApiError } from '../../errors.ts';
import { auditedBy, recordAudit } from '../../workshop/audit.ts';
import { checkPassword } from '../check-password.ts';
import { replaceRecoveryCodes } from './recovery-codes.ts';
import { hasSecondStep } from './state.ts';

/** New recovery codes; the old ones end. */
export async function renewRecoveryCodes(
  caller: PersonCaller,
  password: string,
  address: string,
): Promise<string[]> {
  await checkPassword(caller.personId, password, address);
  if (!(await hasSecondStep(caller.personId)))
    throw new ApiError('conflict', { message: 'Signing in takes no code, so there are no recovery codes.' });
  return db().transaction(async (tx) => {
    const entry = { ...auditedBy(caller, caller.workshopId, address), subject: '' };
    await recordAudit({ ...entry, action: 'recovery codes renewed' }, tx);
    return replaceRecoveryCodes(tx, caller.personId);
  });
}
