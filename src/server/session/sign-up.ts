import { eq } from 'drizzle-orm';
import type { Cookie } from 'lucia';
import type { z } from 'zod';
import type { signUpInput } from '../../contract/areas/workshop.ts';
import { config } from '../config.ts';
import { db } from '../db/client.ts';
import { membership, person, workshop } from '../db/schema.ts';
import { ApiError } from '../errors.ts';
import { limitSignUp } from '../http/limits.ts';
import { newId } from '../ids.ts';
import { mailKnownAddress } from '../mail/known-address-mail.ts';
import { recordAudit } from '../workshop/audit.ts';
import { startSession } from './lucia.ts';
import { hashPassword } from './password.ts';

export interface SignUpRequest extends z.output<typeof signUpInput> {
  readonly address: string;
  readonly cookieHeader: string | undefined;
}

/** Makes a person, their workshop with them as owner, and signs them in. */
export async function signUp(request: SignUpRequest): Promise<{ personId: string; cookie: Cookie }> {
  if (config().signUp !== 'open') throw new ApiError('sign_up_closed');
  await limitSignUp(request.address);
  const passwordHash = await hashPassword(request.password);
  const personId = await db().transaction(async (tx) => {
    const workshopId = newId();
    const [made] = await tx
      .insert(person)
      .values({ id: newId(), email: request.email, name: request.name, passwordHash })
      .onConflictDoNothing({ target: person.email })
      .returning({ id: person.id });
    if (made === undefined) {
      void mailKnownAddress(request.email);
      throw new ApiError('conflict', {
        message: 'This e-mail address has an account. Sign in with it, or use another one.',
      });
    }
    await tx.insert(workshop).values({ id: workshopId, name: request.workshop });
    await tx.insert(membership).values({ personId: made.id, workshopId, role: 'owner' });
    await tx.update(person).set({ currentWorkshopId: workshopId }).where(eq(person.id, made.id));
    await recordAudit(
      {
        workshopId,
        personId: made.id,
        who: request.name,
        action: 'workshop made',
        subject: request.workshop,
        address: request.address,
      },
      tx,
    );
    return made.id;
  });
  return { personId, cookie: await startSession(personId, request.cookieHeader) };
}
