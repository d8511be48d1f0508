import { config } from '../config.ts';
import type { Mail } from './queue-mail.ts';

/** Tells a person what was changed about their signing in, so that they notice when it was somebody else. */
export const signInChangedMail = (
  to: { readonly email: string; readonly name: string },
  what: string,
): Mail => ({
  kind: 'sign-in changed',
  to: to.email,
  subject: `Your account: ${what}`,
  parts: [
    `Hello ${to.name},`,
    `this happened to your account: ${what}. The sessions elsewhere have ended.`,
    'If that was not you, set a new password now.',
    { label: 'Set a new password', link: `${config().origin}/reset` },
  ],
});
