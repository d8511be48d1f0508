// @ts-check
import { existsSync } from 'node:fs';
import { resolve } from 'node:path';
import { prepareCheckout } from './copy.mjs';
import { PlainError } from './lib/plain-error.mjs';
import { runMain } from './lib/run-main.mjs';
import { runTool } from './lib/run-tool.mjs';
import { say } from './lib/say.mjs';
import { withServices } from './lib/with-services.mjs';

/** `npm run backup -- FILE`: database and objects into one new file, while the copy runs or not. */
let stop = async () => {};

await runMain(
  async () => {
    const [given] = process.argv.slice(2);
    if (!given) throw new PlainError('Into which file? npm run backup -- FILE');
    const file = resolve(given);
    if (existsSync(file))
      throw new PlainError(`${file} is there already; a backup never overwrites one. Give another name.`);
    await prepareCheckout(say);
    const made = await withServices(say, (env) => runTool('backup', [file], env), {
      onStop: (given) => {
        stop = given;
      },
    });
    say(`Backed up ${made.objects} objects and the database: ${file} (${made.bytes} bytes)`);
    say('It holds everything, passwords’ hashes and the secret too: keep it as safe as the data.');
    process.exit(0);
  },
  { stop: () => stop() },
);
