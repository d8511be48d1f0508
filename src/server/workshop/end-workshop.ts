import { eq } from 'drizzle-orm';
import type { PersonCaller } from '../access.ts';
import { db } from '../db/client.ts';
import { workshop } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { checkPassword } from '../session/check-password.ts';
import { auditedBy, recordAudit } from './audit.ts';

const GRACE_MS = 30 * 86_400_000;

/** Has the current workshop deleted in 30 days. Its name is typed and the password given, so that it is no slip. */
export async function endWorkshop(
  caller: PersonCaller,
  given: { readonly name: string; readonly password: string },
  address: string,
): Promise<Date> {
  const [here] = await db().select().from(workshop).where(eq(workshop.id, caller.workshopId));
  if (here === undefined) throw new ApiError('not_found');
  if (given.name.trim() !== here.name)
    throw new ApiError('invalid', {
      message: 'The name that you typed is not the workshop’s. Nothing was changed.',
      details: [{ path: 'name', message: `is "${here.name}" when it is this workshop` }],
    });
  await checkPassword(caller.personId, given.password, address);
  const endsAt = new Date(Date.now() + GRACE_MS);
  await db().transaction(async (tx) => {
    await tx.update(workshop).set({ endsAt }).where(eq(workshop.id, here.id));
    const entry = {
      ...auditedBy(caller, here.id, address),
      subject: `on ${endsAt.toISOString().slice(0, 10)}`,
    };
    await recordAudit({ ...entry, action: 'workshop to be deleted' }, tx);
  });
  return endsAt;
}

/** Keeps it after all. */
export const keepWorkshop = (caller: PersonCaller, address: string): Promise<void> =>
  db().transaction(async (tx) => {
    await tx.update(workshop).set({ endsAt: null }).where(eq(workshop.id, caller.workshopId));
    const entry = { ...auditedBy(caller, caller.workshopId, address), subject: '' };
    await recordAudit({ ...entry, action: 'workshop kept' }, tx);
  });
