// @ts-check
import { installPackages } from './lib/install-packages.mjs';
import { runMain } from './lib/run-main.mjs';
import { runTypeScript } from './lib/run-typescript.mjs';

/** `npm run measure -- FILE [--json]`: a capture read and measured at the terminal, by the product's own engine. */
await runMain(async () => {
  await installPackages((line) => void process.stderr.write(`${line}\n`));
  process.exitCode = await runTypeScript('scripts/measure-cli.ts', process.argv.slice(2));
});
