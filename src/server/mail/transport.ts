import nodemailer, { type Transporter } from 'nodemailer';
import { config } from '../config.ts';

const WAIT_MS = 10_000;

let made: Transporter | undefined;

/** The way to the mail server that `SMTP_URL` names. */
export function transport(): Transporter {
  made ??= nodemailer.createTransport({
    url: config().mail.url,
    connectionTimeout: WAIT_MS,
    greetingTimeout: WAIT_MS,
    socketTimeout: WAIT_MS,
    // Only what is given here goes out: no files or addresses are read for a mail.
    disableFileAccess: true,
    disableUrlAccess: true,
  });
  return made;
}
