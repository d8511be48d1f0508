import { eq } from 'drizzle-orm';
import { db } from '../db/client.ts';
import { person } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { forgetSignInTries, limitSignIn } from '../http/limits.ts';
import { verifyPassword } from './password.ts';

/** Asks a signed-in person for their password again before something about signing in changes. Tries are limited. */
export async function checkPassword(personId: string, password: string, address: string): Promise<void> {
  await limitSignIn(`again ${personId}`, address);
  const [row] = await db()
    .select({ passwordHash: person.passwordHash })
    .from(person)
    .where(eq(person.id, personId));
  if (row === undefined || !(await verifyPassword(row.passwordHash, password)))
    throw new ApiError('wrong_password');
  await forgetSignInTries(`again ${personId}`, address);
}
