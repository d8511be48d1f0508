import { eq, inArray, sql } from 'drizzle-orm';
import type { PersonCaller } from '../access.ts';
import { audit, jobEntry, jobPhoto, mark, membership, person, session, token } from '../db/schema.ts';
import { newId } from '../ids.ts';
import { inTransaction } from '../queue/transaction.ts';
import { auditedBy, recordAudit } from '../workshop/audit.ts';
import { endMembership } from '../workshop/end-membership.ts';
import { checkPassword } from './check-password.ts';
import { forgetSecondStep } from './second-step/end-second-step.ts';

const NO_NAME = 'former member';

/**
 * Erases a person: address, password, sessions, tokens and memberships go. What they made stays, signed with the name that
 * they choose, or as a former member. The last owner of a workshop cannot.
 */
export async function eraseMe(
  caller: PersonCaller,
  given: { readonly password: string; readonly name?: string | undefined },
  address: string,
): Promise<void> {
  await checkPassword(caller.personId, given.password, address);
  const { personId } = caller;
  const name = given.name || NO_NAME;
  await inTransaction(async ({ tx }) => {
    const held = await tx
      .select({ workshopId: membership.workshopId })
      .from(membership)
      .where(eq(membership.personId, personId))
      .orderBy(membership.workshopId);
    for (const { workshopId } of held) {
      await endMembership(tx, workshopId, personId);
      const entry = { ...auditedBy({ ...caller, name }, workshopId), action: 'account erased', subject: '' };
      await recordAudit(entry, tx);
    }
    await tx.delete(session).where(eq(session.userId, personId));
    await tx.delete(token).where(eq(token.personId, personId));
    await forgetSecondStep(tx, personId);
    await tx.update(mark).set({ author: name }).where(eq(mark.createdBy, personId));
    await tx.update(jobEntry).set({ author: name }).where(eq(jobEntry.createdBy, personId));
    await tx.update(jobPhoto).set({ author: name }).where(eq(jobPhoto.createdBy, personId));
    await tx.update(audit).set({ who: name, address: '' }).where(eq(audit.personId, personId));
    const [who] = await tx.select({ email: person.email }).from(person).where(eq(person.id, personId));
    const workshops = held.map((one) => one.workshopId);
    // Others' lines may name them too: "role changed: Ada to owner", "invited: ada@…".
    await tx
      .update(audit)
      .set({
        subject: sql`replace(replace(${audit.subject}, ${who?.email ?? personId}, ${name}), ${caller.name}, ${name})`,
      })
      .where(inArray(audit.workshopId, workshops));
    await tx
      .update(person)
      .set({ name, email: `${newId()}@erased.invalid`, passwordHash: 'none', currentWorkshopId: null })
      .where(eq(person.id, personId));
  });
}
