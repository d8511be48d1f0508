import { config } from '../config.ts';
import { sendMail } from './send-mail.ts';

/** The link that makes the account. It opens a page with a button, since some mail programs open links by themselves. */
export const mailConfirmation = (
  account: { readonly email: string; readonly name: string; readonly workshop: string },
  secret: string,
): Promise<boolean> =>
  sendMail({
    to: account.email,
    subject: 'Confirm your address to set up your workshop',
    text: [
      `Hello ${account.name},`,
      '',
      `Open this link to set up "${account.workshop}". It works once, for a day:`,
      '',
      `${config().origin}/sign-up/confirm?key=${secret}`,
      '',
      'If you did not ask for this, do nothing: no account is made.',
      '',
    ].join('\n'),
  });
