// @ts-check
import { createServer } from 'node:http';
import { runAlone } from '../scripts/lib/run-alone.mjs';
import { serveChild } from '../scripts/lib/serve-child.mjs';
import { startServiceProcess } from '../scripts/lib/start-service-process.mjs';

/**
 * Catches the mail that a copy sends: SMTP on loopback, files on disk, and pages to read them. Nothing is passed on.
 */

const LARGEST_MAIL_BYTES = 10 * 1024 * 1024;

/**
 * @param {import('../scripts/lib/instance.mjs').Instance} instance
 * @param {{ say: import('../scripts/lib/say.mjs').Say }} options
 */
export async function startMailCatcher(instance, { say }) {
  const { ports, program } = await startServiceProcess(instance, {
    name: 'mail catcher',
    file: import.meta.filename,
    env: { MAIL_FOLDER: instance.folder('mail') },
    say,
  });
  return {
    program,
    page: `http://127.0.0.1:${ports.pages}/`,
    env: { SMTP_URL: `smtp://127.0.0.1:${ports.smtp}`, MAIL_FROM: 'Gapmark <gapmark@localhost>' },
  };
}

/** @param {string} folder @param {{ smtp?: number, pages?: number }} ports */
export async function serveMailCatcher(folder, ports) {
  // Loaded here, as a start from nothing reads this file before the packages are installed.
  const { SMTPServer } = await import('smtp-server');
  const { openMailbox } = await import('./mail/mailbox.mjs');
  const { makePages } = await import('./mail/handle.mjs');
  const mailbox = openMailbox(folder);
  const smtp = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    disableReverseLookup: true,
    size: LARGEST_MAIL_BYTES,
    onData(stream, _session, done) {
      /** @type {Buffer[]} */
      const pieces = [];
      stream.on('data', (data) => pieces.push(data));
      stream.on('end', () => {
        if (stream.sizeExceeded) {
          done(Object.assign(new Error('The message is too large.'), { responseCode: 552 }));
          return;
        }
        mailbox.add(Buffer.concat(pieces)).then(() => done(), done);
      });
    },
  });
  smtp.on('error', (error) => process.stderr.write(`SMTP: ${String(error)}\n`));
  const pages = createServer(makePages(mailbox));
  await listen((ready) => smtp.listen(ports.smtp ?? 0, '127.0.0.1', ready));
  await listen((ready) => pages.listen(ports.pages ?? 0, '127.0.0.1', ready));
  return { smtp: smtp.server, pages };
}

/** @param {(ready: () => void) => import('node:net').Server} start */
function listen(start) {
  return new Promise((resolve, reject) => {
    start(() => resolve(undefined)).once('error', reject);
  });
}

if (import.meta.filename === process.argv[1]) {
  const folder = process.env.MAIL_FOLDER;
  if (folder === undefined) {
    await runAlone(async (instance, say) => {
      const { env, page } = await startMailCatcher(instance, { say });
      return { ...env, MAIL_PAGE: page };
    });
  } else {
    await serveChild((ports) => serveMailCatcher(folder, ports));
  }
}
