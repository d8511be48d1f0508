import { config } from '../config.ts';
import type { Mail } from './queue-mail.ts';

/** Tells the holder of an address that somebody wanted to use it, for an account or as a new address. */
export const knownAddressMail = (to: string): Mail => ({
  kind: 'known address',
  to,
  subject: 'You have an account already',
  parts: [
    'Somebody, perhaps you, tried to set up an account with this address. It has one already, and nothing was changed.',
    { label: 'Sign in', link: `${config().origin}/sign-in` },
    { label: 'Set a new password', link: `${config().origin}/reset` },
  ],
});
