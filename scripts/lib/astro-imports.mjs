// @ts-check
import { readdirSync, readFileSync } from 'node:fs';
import { join, posix } from 'node:path';
import rooms from './rooms.cjs';
import { root } from './root.mjs';

/**
 * The import rules for `.astro` files, which the general checker does not read.
 * @returns {{ files: number, faults: string[] }}
 */
export function checkAstroImports() {
  const files = readdirSync(join(root, 'src'), { recursive: true, encoding: 'utf8' })
    .filter((name) => name.endsWith('.astro'))
    .map((name) => `src/${name}`);
  return {
    files: files.length,
    faults: files.flatMap((file) => faultsIn(file, readFileSync(join(root, file), 'utf8'))),
  };
}

/**
 * @param {string} file from the root
 * @param {string} text
 */
export function faultsIn(file, text) {
  const room = Object.values(rooms.rooms).find(({ path }) => new RegExp(`^${path}`).test(file));
  if (!room) return [`${file}: lies in no room of scripts/lib/rooms.cjs`];
  const allowed = [room.path, ...room.may].map((path) => new RegExp(`^${path}`));
  return [...text.matchAll(/(import|export)\s+(type\s)?(?:[^'";]*?from\s*)?['"](\.[^'"]+)['"]/g)].flatMap(
    (match) => {
      const target = posix.normalize(posix.join(posix.dirname(file), match[3] ?? ''));
      return allowed.some((one) => one.test(target)) ? [] : [`${file}: may not import ${target}`];
    },
  );
}
