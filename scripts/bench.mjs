// @ts-check
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { installPackages } from './lib/install-packages.mjs';
import { PlainError } from './lib/plain-error.mjs';
import { root } from './lib/root.mjs';
import { runMain } from './lib/run-main.mjs';
import { runTypeScript } from './lib/run-typescript.mjs';
import { say } from './lib/say.mjs';

/** `npm run bench [-- NAME…]`: each file of bench/, or the named ones, one after the other. */
await runMain(async () => {
  await installPackages(say);
  const all = readdirSync(join(root, 'bench')).filter((name) => name.endsWith('.ts'));
  const wanted = process.argv.slice(2);
  const chosen = wanted.length === 0 ? all : all.filter((name) => wanted.includes(name.replace(/\.ts$/, '')));
  if (chosen.length === 0) throw new PlainError(`There is no such benchmark. These are: ${all.join(', ')}`);
  for (const name of chosen) {
    say(`\n== bench/${name}`);
    const code = await runTypeScript(`bench/${name}`, [], { nodeOptions: ['--expose-gc'] });
    if (code !== 0) throw new PlainError(`bench/${name} ended with code ${code}.`);
  }
});
