import { eq } from 'drizzle-orm';
import type { Role } from '../../../contract/roles.ts';
import { db, type Executor } from '../../db/client.ts';
import { invitation, person, workshop } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { hashSecret } from '../../ids.ts';

export interface OpenInvitation {
  readonly id: string;
  readonly workshopId: string;
  readonly workshop: string;
  readonly email: string;
  readonly role: Role;
  readonly invitedBy: string;
  readonly expiresAt: Date;
  /** Whether the address has an account, which then takes the invitation after signing in. */
  readonly hasAccount: boolean;
}

const ended = (message: string) =>
  new ApiError('link_ended', { message, hint: 'Ask the person who invited you for a new one.' });

/** The invitation of a link's secret. @throws ApiError in words when it is not known, was used, withdrawn, or has ended. */
export async function openInvitation(secret: string, on: Executor = db()): Promise<OpenInvitation> {
  const [found] = await on
    .select({ row: invitation, workshop: workshop.name, invitedBy: person.name })
    .from(invitation)
    .innerJoin(workshop, eq(workshop.id, invitation.workshopId))
    .innerJoin(person, eq(person.id, invitation.invitedBy))
    .where(eq(invitation.secretHash, hashSecret(secret)))
    .for('update', { of: invitation });
  if (found === undefined) throw ended('This link is no invitation that is known here.');
  const { row } = found;
  if (row.acceptedAt !== null) throw ended('This invitation was used before. It works once.');
  if (row.withdrawnAt !== null) throw ended('This invitation was withdrawn.');
  if (row.expiresAt.getTime() <= Date.now()) throw ended('This invitation has ended: it works for a week.');
  const [account] = await on.select({ id: person.id }).from(person).where(eq(person.email, row.email));
  return {
    id: row.id,
    workshopId: row.workshopId,
    workshop: found.workshop,
    email: row.email,
    role: row.role,
    invitedBy: found.invitedBy,
    expiresAt: row.expiresAt,
    hasAccount: account !== undefined,
  };
}
