import { config } from '../config.ts';
import type { Mail } from './queue-mail.ts';

/** To the new address: the link that takes it into use. */
export const newAddressMail = (name: string, email: string, secret: string, expiresAt: Date): Mail => ({
  kind: 'address change',
  to: email,
  subject: 'Confirm your new address',
  notAfter: expiresAt,
  parts: [
    `Hello ${name},`,
    'this link takes this address into use for signing in. It works once, for a day.',
    { label: 'Use this address', link: `${config().origin}/e-mail?key=${secret}` },
    'If you did not ask for this, do nothing.',
  ],
});

/** To the old address, once another is in use. */
export const oldAddressMail = (name: string, oldEmail: string): Mail => ({
  kind: 'address changed',
  to: oldEmail,
  subject: 'Your address was changed',
  parts: [
    `Hello ${name},`,
    'your account now has another e-mail address; this one no longer signs in. All sessions have ended.',
    'If that was not you, tell an owner of your workshop at once.',
  ],
});
