import nodemailer, { type Transporter } from 'nodemailer';
import { config } from '../config.ts';
import { log } from '../log.ts';

export interface Mail {
  readonly to: string;
  readonly subject: string;
  readonly text: string;
}

let transport: Transporter | undefined;

const WAIT_MS = 10_000;

/** One line, as a header must be. */
const oneLine = (text: string) => text.replace(/\s+/g, ' ').trim().slice(0, 150);

/** Sends a mail in plain text; gives whether the mail server took it. The log says that it failed, not to whom it went. */
export async function sendMail(mail: Mail): Promise<boolean> {
  const { url, from } = config().mail;
  if (url === undefined) return false;
  transport ??= nodemailer.createTransport({
    url,
    connectionTimeout: WAIT_MS,
    greetingTimeout: WAIT_MS,
    socketTimeout: WAIT_MS,
    // Only what is given here goes out: no files or addresses are read for a mail.
    disableFileAccess: true,
    disableUrlAccess: true,
  });
  try {
    await transport.sendMail({ from, to: mail.to, subject: oneLine(mail.subject), text: mail.text });
    return true;
  } catch (error) {
    log.warn(
      { code: error instanceof Error && 'code' in error ? error.code : undefined },
      'a mail was not sent',
    );
    return false;
  }
}
