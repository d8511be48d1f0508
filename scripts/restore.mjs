// @ts-check
import { existsSync, readFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { prepareCheckout } from './copy.mjs';
import { PlainError } from './lib/plain-error.mjs';
import { runMain } from './lib/run-main.mjs';
import { runTool } from './lib/run-tool.mjs';
import { say } from './lib/say.mjs';
import { withServices } from './lib/with-services.mjs';
import { writeFileAtomically } from './lib/write-file.mjs';

/** `npm run restore -- FILE`: a backup into an empty data folder; the next start goes on from there. */
let stop = async () => {};

await runMain(
  async () => {
    const [given] = process.argv.slice(2);
    if (!given) throw new PlainError('From which file? npm run restore -- FILE');
    const file = resolve(given);
    if (!existsSync(file)) throw new PlainError(`There is no file ${file}.`);
    await prepareCheckout(say);
    const had = await withServices(
      say,
      async (env, instance) => {
        const done = await runTool('restore', [file], env);
        if (instance !== null) keepSecret(join(instance.dataDir, 'secrets.json'), String(done.secret));
        return { objects: done.objects, secret: done.secret, hosted: instance === null };
      },
      {
        mayRun: false,
        onStop: (given) => {
          stop = given;
        },
      },
    );
    say(`Restored ${had.objects} objects and the database.`);
    if (had.hosted) say(`Set GAPMARK_SECRET to: ${had.secret}`);
    else say('The next npm start on this folder goes on from there.');
    process.exit(0);
  },
  { stop: () => stop() },
);

/** What is sealed in the database opens with the secret that it was sealed with. @param {string} path @param {string} seal */
function keepSecret(path, seal) {
  const secrets = JSON.parse(readFileSync(path, 'utf8'));
  writeFileAtomically(path, `${JSON.stringify({ ...secrets, seal }, null, 2)}\n`);
}
