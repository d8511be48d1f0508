import type { Role } from '../../contract/roles.ts';
import { config } from '../config.ts';
import type { Mail } from './queue-mail.ts';

interface Invited {
  readonly email: string;
  readonly role: Role;
  readonly workshop: string;
  readonly invitedBy: string;
  readonly expiresAt: Date;
}

export const invitationAddress = (secret: string): string => `${config().origin}/invitation?key=${secret}`;

const article = (role: Role) => (role === 'technician' || role === 'learner' ? 'a' : 'an');

/** Invites somebody into a workshop. */
export const invitationMail = (invited: Invited, secret: string): Mail => ({
  kind: 'invitation',
  to: invited.email,
  subject: `${invited.invitedBy} invites you to ${invited.workshop}`,
  notAfter: invited.expiresAt,
  parts: [
    `${invited.invitedBy} invites you to work in "${invited.workshop}" as ${article(invited.role)} ${invited.role}.`,
    'There, captures of engines that crank but do not start are measured, compared and talked over.',
    { label: 'Look at the invitation', link: invitationAddress(secret) },
    'It works once, for a week, and for this address only. If you do not want it, do nothing.',
  ],
});
