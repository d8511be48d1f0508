import { config } from '../config.ts';
import type { Mail } from './queue-mail.ts';

/** The link that sets a new password. */
export const resetMail = (
  to: { readonly email: string; readonly name: string },
  secret: string,
  expiresAt: Date,
): Mail => ({
  kind: 'password reset',
  to: to.email,
  subject: 'Set a new password',
  notAfter: expiresAt,
  parts: [
    `Hello ${to.name},`,
    'somebody, perhaps you, asked to set a new password for your account. The link works once, for an hour.',
    { label: 'Set a new password', link: `${config().origin}/reset/new?key=${secret}` },
    'If it was not you, do nothing: your password stays as it is.',
  ],
});
