// @ts-check
import { createHash, randomBytes } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { link, mkdir, open, rename, rm } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import { S3Error } from './s3-error.mjs';

/**
 * One object is one file: its bytes, then what is known about it as JSON, then 16 bytes that say where that begins. So an
 * object and its description appear, change and go in one rename, whatever is killed when.
 *
 * @typedef {object} Description
 * @property {number} size bytes
 * @property {string} etag with its quotes
 * @property {string} modified ISO 8601, UTC
 * @property {Record<string, string>} headers that come back with the object: content-type, x-amz-meta-…
 * @property {{ algorithm: string, value: string } | null} checksum
 */

const MARK = 'OBJ1';
const TAIL_BYTES = 16;

/**
 * Writes a stream to a temporary file; nothing is visible until `placeFile()`.
 * @param {string} temporaryFolder
 * @param {AsyncIterable<Buffer> | import('node:stream').Readable} source
 * @param {import('node:stream').Transform[]} through
 * @returns {Promise<{ path: string, size: number, md5: string }>}
 */
export async function writeTemporary(temporaryFolder, source, through) {
  const path = join(temporaryFolder, randomBytes(16).toString('hex'));
  const md5 = createHash('md5');
  let size = 0;
  try {
    await pipeline(
      /** @type {any} */ ([
        source,
        ...through,
        async function* (/** @type {AsyncIterable<Buffer>} */ content) {
          for await (const data of content) {
            md5.update(data);
            size += data.length;
            yield data;
          }
        },
        createWriteStream(path, { mode: 0o600, highWaterMark: 256 * 1024 }),
      ]),
    );
  } catch (error) {
    await rm(path, { force: true });
    throw error;
  }
  return { path, size, md5: md5.digest('hex') };
}

/**
 * Completes a temporary file with its description and moves it to its place at once.
 * @param {string} temporary
 * @param {string} place
 * @param {Description} description
 * @param {{ onlyIfNew?: boolean, durable: boolean }} how
 */
export async function placeFile(temporary, place, description, { onlyIfNew = false, durable }) {
  try {
    const file = await open(temporary, 'a');
    try {
      const json = Buffer.from(JSON.stringify(description));
      await file.write(
        Buffer.concat([
          json,
          Buffer.from(MARK + String(json.length).padStart(TAIL_BYTES - MARK.length, '0')),
        ]),
      );
      if (durable) await file.sync();
    } finally {
      await file.close();
    }
    for (let attempt = 0; ; attempt++) {
      await mkdir(dirname(place), { recursive: true, mode: 0o700 });
      try {
        if (onlyIfNew) await link(temporary, place);
        else await rename(temporary, place);
        break;
      } catch (error) {
        const code = error instanceof Error && 'code' in error ? error.code : '';
        if (code === 'EEXIST') throw new S3Error('PreconditionFailed', 'There is such an object already.');
        // Removing the last object of a folder removes the folder, and may do so right now.
        if (code !== 'ENOENT' || attempt >= 20) throw error;
      }
    }
    if (durable) await syncFolder(dirname(place));
  } finally {
    await rm(temporary, { force: true });
  }
}

/** @param {string} folder */
async function syncFolder(folder) {
  const handle = await open(folder, 'r').catch(() => null);
  if (!handle) return; // emptied and removed again meanwhile
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}

/**
 * Opens an object; the handle reads what was there at this moment even when the object is replaced or removed.
 * @param {string} path
 * @returns {Promise<{ file: import('node:fs/promises').FileHandle, description: Description } | null>} null: none such
 */
export async function openStored(path) {
  const file = await open(path, 'r').catch((error) => {
    if (error.code === 'ENOENT' || error.code === 'ENOTDIR') return null;
    throw error;
  });
  if (!file) return null;
  try {
    const { size } = await file.stat();
    const tail = (
      await file.read(Buffer.alloc(TAIL_BYTES), 0, TAIL_BYTES, size - TAIL_BYTES)
    ).buffer.toString('latin1');
    if (!tail.startsWith(MARK)) throw new Error(`${path} is damaged`);
    const length = Number(tail.slice(MARK.length));
    const json = (
      await file.read(Buffer.alloc(length), 0, length, size - TAIL_BYTES - length)
    ).buffer.toString('utf8');
    return { file, description: JSON.parse(json) };
  } catch (error) {
    await file.close();
    throw error;
  }
}

/** @param {string} path @returns {Promise<Description | null>} */
export async function describeStored(path) {
  const stored = await openStored(path);
  await stored?.file.close();
  return stored?.description ?? null;
}
