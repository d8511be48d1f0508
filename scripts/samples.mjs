// @ts-check
/** Makes `public/samples` again from the program in `samples/`. */
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { build } from 'esbuild';

const folder = await mkdtemp(join(tmpdir(), 'gapmark-samples-'));
try {
  const outfile = join(folder, 'make.mjs');
  await build({
    entryPoints: ['samples/make.ts'],
    bundle: true,
    platform: 'node',
    format: 'esm',
    outfile,
    logLevel: 'error',
  });
  await import(pathToFileURL(outfile).href);
} finally {
  await rm(folder, { recursive: true });
}
