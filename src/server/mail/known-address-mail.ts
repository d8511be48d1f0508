import { config } from '../config.ts';
import { sendMail } from './send-mail.ts';

/** Tells the holder of an address that somebody tried to sign up with it. */
export const mailKnownAddress = (to: string): Promise<boolean> =>
  sendMail({
    to,
    subject: 'You have an account already',
    text: [
      'Somebody, perhaps you, tried to set up a workshop with this address. It has an account already, and nothing was changed.',
      '',
      `Sign in here: ${config().origin}/sign-in`,
      '',
    ].join('\n'),
  });
