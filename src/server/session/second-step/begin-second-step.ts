import { eq, isNull } from 'drizzle-orm';
import type { PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { person, secondStep } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { seal } from '../../seal.ts';
import { checkPassword } from '../check-password.ts';
import { newTotpKey, totpAddress } from './totp.ts';

/** Makes a key for the person's authenticator. It counts once a code of it was confirmed; until then another may be made. */
export async function beginSecondStep(
  caller: PersonCaller,
  password: string,
  address: string,
): Promise<{ key: string; address: string }> {
  await checkPassword(caller.personId, password, address);
  const key = newTotpKey();
  const sealed = seal('second step', key);
  const [made] = await db()
    .insert(secondStep)
    .values({ personId: caller.personId, sealed })
    .onConflictDoUpdate({
      target: secondStep.personId,
      set: { sealed, lastStep: 0 },
      setWhere: isNull(secondStep.confirmedAt),
    })
    .returning({ personId: secondStep.personId });
  if (made === undefined)
    throw new ApiError('conflict', { message: 'Signing in takes a code already.', hint: 'End that first.' });
  const [who] = await db().select({ email: person.email }).from(person).where(eq(person.id, caller.personId));
  return { key, address: totpAddress(key, who?.email ?? '') };
}
