// @ts-check
import { readdir } from 'node:fs/promises';
import { join } from 'node:path';
import { keyOfEscaped, partOfName } from './key-path.mjs';

/**
 * The keys of a bucket in the order of their UTF-8 bytes, as S3 lists them, folder by folder: no index to keep right.
 * Folders that cannot hold a key with the prefix, or hold only keys up to `after`, are not opened.
 * @param {string} folder the bucket's
 * @param {{ prefix: string, after: string }} options
 * @returns {AsyncGenerator<{ key: string, path: string }>}
 */
export async function* listKeys(folder, { prefix, after }) {
  yield* walk(folder, '', Buffer.from(prefix), Buffer.from(after));
}

/**
 * @param {string} folder @param {string} sofar escaped @param {Buffer} prefix @param {Buffer} after
 * @returns {AsyncGenerator<{ key: string, path: string }>}
 */
async function* walk(folder, sofar, prefix, after) {
  const names = await readdir(folder).catch((error) => {
    if (error.code === 'ENOENT') return [];
    throw error;
  });
  const entries = names.map((name) => {
    const { text, folder: isFolder } = partOfName(name);
    const escaped = sofar + text;
    return { name, escaped, isFolder, bytes: bytesOf(escaped) };
  });
  entries.sort((a, b) => Buffer.compare(a.bytes, b.bytes));
  for (const { name, escaped, isFolder, bytes } of entries) {
    const shared = Math.min(bytes.length, prefix.length);
    if (!bytes.subarray(0, shared).equals(prefix.subarray(0, shared))) continue;
    if (isFolder) {
      // Everything inside begins with these bytes: all of it lies before `after` when they differ and are lower.
      const start = after.subarray(0, bytes.length);
      if (Buffer.compare(bytes, start) < 0) continue;
      yield* walk(join(folder, name), escaped, prefix, after);
    } else if (bytes.length >= prefix.length && (after.length === 0 || Buffer.compare(bytes, after) > 0)) {
      yield { key: keyOfEscaped(escaped), path: join(folder, name) };
    }
  }
}

/** Names are cut between whole escapes only, so each piece decodes by itself. @param {string} escaped */
function bytesOf(escaped) {
  return Buffer.from(
    escaped.replace(/%([0-9A-F]{2})/g, (_, hex) => String.fromCharCode(Number.parseInt(hex, 16))),
    'latin1',
  );
}
