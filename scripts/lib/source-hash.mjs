// @ts-check
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { root } from './root.mjs';

/** What the built product is made of. Tests are not, so changing one builds nothing. */
const SOURCES = [
  'src',
  'public',
  'samples',
  'astro.config.mjs',
  'tsconfig.json',
  'package.json',
  'package-lock.json',
  'scripts/build.mjs',
];

/** One digest over names and contents of all sources. */
export function sourceHash() {
  const hash = createHash('sha256').update(process.version);
  for (const path of SOURCES.flatMap(filesUnder))
    hash.update(`\0${path}\0`).update(readFileSync(join(root, path)));
  return hash.digest('hex');
}

/** @param {string} path from the root @returns {string[]} */
function filesUnder(path) {
  const absolute = join(root, path);
  if (!existsSync(absolute)) return [];
  if (!statSync(absolute).isDirectory()) return /\.test\.[a-z]+$/.test(path) ? [] : [path];
  return readdirSync(absolute)
    .sort()
    .flatMap((name) => filesUnder(`${path}/${name}`));
}
