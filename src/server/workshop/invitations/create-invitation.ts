import { and, count, eq, isNull } from 'drizzle-orm';
import type { InvitationJson } from '../../../contract/areas/people.ts';
import type { Role } from '../../../contract/roles.ts';
import type { PersonCaller } from '../../access.ts';
import { invitation, membership, person, workshop } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { limitInvitations } from '../../http/limits.ts';
import { hashSecret, newId, newSecret } from '../../ids.ts';
import { invitationAddress, invitationMail } from '../../mail/invitation-mail.ts';
import { mailWorks, queueMail } from '../../mail/queue-mail.ts';
import { inTransaction } from '../../queue/transaction.ts';
import { auditedBy, recordAudit } from '../audit.ts';

const WITHIN_MS = 7 * 86_400_000;
const OPEN_LIMIT = 200;

/**
 * Invites an address into the current workshop, by mail. An earlier invitation of the same address ends. Where no mail can be
 * sent, the link is in the answer and nowhere else.
 */
export async function createInvitation(
  caller: PersonCaller,
  { email, role }: { readonly email: string; readonly role: Role },
  address: string,
): Promise<InvitationJson & { url: string | null }> {
  await limitInvitations(caller.workshopId);
  const id = newId();
  const secret = newSecret();
  const expiresAt = new Date(Date.now() + WITHIN_MS);
  const { workshopId } = caller;
  const createdAt = await inTransaction(async (transaction) => {
    const { tx } = transaction;
    const [here] = await tx.select().from(workshop).where(eq(workshop.id, workshopId)).for('update');
    if (here === undefined) throw new ApiError('not_found');
    await notThereYet(tx, workshopId, email);
    const open = and(
      eq(invitation.workshopId, workshopId),
      isNull(invitation.acceptedAt),
      isNull(invitation.withdrawnAt),
    );
    await tx
      .update(invitation)
      .set({ withdrawnAt: new Date() })
      .where(and(open, eq(invitation.email, email)));
    const [waiting] = await tx.select({ total: count() }).from(invitation).where(open);
    if ((waiting?.total ?? 0) >= OPEN_LIMIT)
      throw new ApiError('conflict', {
        message: `${OPEN_LIMIT} invitations are open.`,
        hint: 'Withdraw some that are no longer needed.',
      });
    const [made] = await tx
      .insert(invitation)
      .values({
        id,
        workshopId,
        email,
        role,
        secretHash: hashSecret(secret),
        invitedBy: caller.personId,
        expiresAt,
      })
      .returning({ createdAt: invitation.createdAt });
    await queueMail(
      transaction,
      invitationMail({ email, role, workshop: here.name, invitedBy: caller.name, expiresAt }, secret),
    );
    const entry = { ...auditedBy(caller, workshopId, address), subject: `${email} as ${role}` };
    await recordAudit({ ...entry, action: 'invited' }, tx);
    return made?.createdAt ?? new Date();
  });
  return {
    id,
    email,
    role,
    invitedBy: caller.name,
    createdAt: createdAt.toISOString(),
    expiresAt: expiresAt.toISOString(),
    url: mailWorks() ? null : invitationAddress(secret),
  };
}

type Tx = Parameters<Parameters<typeof inTransaction>[0]>[0]['tx'];

async function notThereYet(tx: Tx, workshopId: string, email: string): Promise<void> {
  const [there] = await tx
    .select({ id: person.id })
    .from(person)
    .innerJoin(membership, eq(membership.personId, person.id))
    .where(and(eq(person.email, email), eq(membership.workshopId, workshopId)));
  if (there !== undefined)
    throw new ApiError('conflict', { message: 'This address belongs to the workshop already.' });
}
