// @ts-check
import { join } from 'node:path';
import { startMailCatcher } from '../docker-free-fakes/mail.mjs';
import { startObjectStore } from '../docker-free-fakes/object-store.mjs';
import { startPostgres } from '../docker-free-fakes/postgres.mjs';
import { openInstance } from './lib/instance.mjs';
import { runAlone } from './lib/run-alone.mjs';
import { step, say as tellTerminal } from './lib/say.mjs';
import { writeFileAtomically } from './lib/write-file.mjs';

/**
 * @typedef {import('./lib/instance.mjs').Instance} Instance
 * @typedef {import('./lib/supervise.mjs').Supervised} Supervised
 *
 * @typedef {object} Services
 * @property {Instance} instance
 * @property {Record<string, string>} env what the product needs to reach them: DATABASE_URL, S3_…, SMTP_URL, MAIL_FROM
 * @property {string} mailPage where caught mail is read; `messages.json` below it is the list for programs
 * @property {{ database: Supervised, store: Supervised, mail: Supervised }} programs
 * @property {() => Promise<void>} stop
 */

/**
 * Starts PostgreSQL, the object store and the mail catcher on one data folder.
 * @param {{ dataDir: string, say?: import('./lib/say.mjs').Say, durable?: boolean, instance?: Instance }} options
 *   `durable: false` is quicker and for tests: a power cut may then lose everything.
 * @returns {Promise<Services>}
 */
export async function startServices({ dataDir, say = tellTerminal, durable = true, instance: given }) {
  const instance = given ?? (await openInstance({ dataDir, say }));
  try {
    const [database, store, mail] = await step(
      say,
      'Starting the database, the object store and the mail catcher, waiting for their first answers',
      () =>
        Promise.all([
          startPostgres(instance, { say, durable }),
          startObjectStore(instance, { say, durable }),
          startMailCatcher(instance, { say }),
        ]),
    );
    const env = { ...database.env, ...store.env, ...mail.env };
    // For commands that are given while this copy runs.
    writeFileAtomically(
      join(instance.folder('run'), 'services.json'),
      JSON.stringify({ ...env, GAPMARK_SECRET: instance.secrets.seal }),
    );
    return {
      instance,
      env,
      mailPage: mail.page,
      programs: { database: database.program, store: store.program, mail: mail.program },
      stop: instance.stop,
    };
  } catch (error) {
    await instance.stop();
    throw error;
  }
}

if (import.meta.filename === process.argv[1]) {
  await runAlone(async (instance, say) => {
    const { env, mailPage } = await startServices({ dataDir: instance.dataDir, instance, say });
    return { ...env, MAIL_PAGE: mailPage };
  });
}
