// @ts-check
import { readdir, readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { promisify } from 'node:util';
import zlib from 'node:zlib';

const brotli = promisify(zlib.brotliCompress);
const gzip = promisify(zlib.gzip);

/** Formats that are not compressed already. */
const TEXT = /\.(css|html|js|json|map|mjs|svg|txt|webmanifest|xml)$/;
const SMALLEST_BYTES = 1024;

/**
 * Writes `x.br` and `x.gz` beside each text file where that is smaller: the web process has no time for it later.
 * @param {string} folder
 */
export async function compressFiles(folder) {
  const entries = await readdir(folder, { recursive: true, withFileTypes: true });
  const paths = entries
    .filter((entry) => entry.isFile() && TEXT.test(entry.name))
    .map((entry) => join(entry.parentPath, entry.name));
  for (const path of paths) {
    const content = await readFile(path);
    if (content.length < SMALLEST_BYTES) continue;
    const [br, gz] = await Promise.all([brotli(content), gzip(content, { level: 9 })]);
    if (br.length < content.length) await writeFile(`${path}.br`, br);
    if (gz.length < content.length) await writeFile(`${path}.gz`, gz);
  }
}
