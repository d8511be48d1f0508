// @ts-check
import { join, resolve } from 'node:path';
import { forgetToken, startCopy } from './copy.mjs';
import { PlainError } from './lib/plain-error.mjs';
import { root } from './lib/root.mjs';
import { runMain } from './lib/run-main.mjs';
import { say } from './lib/say.mjs';

/** `npm start`: the only set-up there is. What it promises is in DEVELOPERS.md, "Starting it". */

const DEFAULT_PORT = 4321;

let stop = async () => {};

async function main() {
  const copy = await startCopy({
    dataDir: resolve(process.env.GAPMARK_DATA || join(root, '.gapmark')),
    // “localhost” may mean ::1 here and 127.0.0.1 there; the address that is printed must be the one that answers.
    host: !process.env.HOST || process.env.HOST === 'localhost' ? '127.0.0.1' : process.env.HOST,
    port: portFrom(process.env.PORT),
    origin: process.env.GAPMARK_ORIGIN || undefined,
    say,
    onStop: (given) => {
      stop = async () => {
        say('- Stopping everything …');
        await given();
        say('Stopped.');
      };
    },
  });
  say(`- Mail that this copy sends is caught here: ${copy.mailPage}`);
  say(`- Data and logs: ${copy.services.instance.dataDir}`);
  say(`Gapmark is ready: ${copy.address}`);
  if (copy.newToken !== null) {
    say(`Demo token: ${copy.newToken}`);
    forgetToken(copy);
  }
  if (process.env.GAPMARK_STARTING_LIBRARY !== 'off') void fillLibrary(copy);
}

/**
 * The starting library is made while people work already; ended in the middle, the next start goes on.
 * @param {import('./copy.mjs').Copy} copy
 */
async function fillLibrary(copy) {
  const { code, stdout, output } = await copy
    .tool('seed-library')
    .catch(() => ({ code: null, stdout: '', output: '' }));
  if (stdout.trim() !== '') say(`- ${stdout.trim()}`);
  // Ended with everything else: nothing is wrong, the next start goes on.
  else if (code !== null && code > 0 && code < 128)
    say(
      `! The starting library is not whole; the next start goes on. What was said:\n${output.trim().slice(-600)}`,
    );
}

/** @param {string | undefined} text */
function portFrom(text) {
  if (!text) return DEFAULT_PORT;
  const port = Number(text);
  if (/^\d+$/.test(text) && port <= 65_535) return port;
  throw new PlainError(`PORT is “${text}”; it must be a number from 0 (any) to 65535.`);
}

await runMain(main, { stop: () => stop(), stopped: 0 });
