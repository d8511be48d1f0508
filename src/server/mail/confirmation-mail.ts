import { config } from '../config.ts';
import type { Mail } from './queue-mail.ts';

/** The link that makes the account. It opens a page with a button, since some mail programs open links by themselves. */
export const confirmationMail = (
  account: { readonly email: string; readonly name: string; readonly workshop: string },
  secret: string,
  expiresAt: Date,
): Mail => ({
  kind: 'sign-up',
  to: account.email,
  subject: 'Confirm your address to set up your workshop',
  notAfter: expiresAt,
  parts: [
    `Hello ${account.name},`,
    `this link sets up "${account.workshop}". It works once, for a day.`,
    { label: 'Confirm your address', link: `${config().origin}/sign-up/confirm?key=${secret}` },
    'If you did not ask for this, do nothing: no account is made.',
  ],
});
