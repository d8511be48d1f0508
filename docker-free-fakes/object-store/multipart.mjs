// @ts-check
import { createHash, randomBytes } from 'node:crypto';
import { mkdir, readdir, readFile, rename, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { S3Error } from './s3-error.mjs';
import { describe } from './store.mjs';
import { describeStored, openStored, placeFile, writeTemporary } from './stored-file.mjs';

/**
 * Uploads in parts: `uploads/<id>/` with `about.json` and a file a part, until they are completed or aborted.
 *
 * @typedef {import('./store.mjs').Store} Store
 * @typedef {{ bucket: string, key: string, headers: Record<string, string>, initiated: string }} About
 */

const SMALLEST_PART_BYTES = 5 * 1024 * 1024;
const MOST_PARTS = 10_000;

/** @param {Store} store */
export function multipart(store) {
  /** @param {string} uploadId */
  const about = async (uploadId) => {
    const text = /^[0-9a-f]{32}$/.test(uploadId)
      ? await readFile(join(store.uploads, uploadId, 'about.json'), 'utf8').catch(() => null)
      : null;
    if (text === null)
      throw new S3Error(
        'NoSuchUpload',
        'The specified upload does not exist; it may be completed or aborted.',
      );
    /** @type {About} */
    const parsed = JSON.parse(text);
    return parsed;
  };

  /** @param {string} uploadId @param {string} bucket @param {string} key */
  const belonging = async (uploadId, bucket, key) => {
    const found = await about(uploadId);
    if (found.bucket !== bucket || found.key !== key)
      throw new S3Error('NoSuchUpload', 'The upload is for another object.');
    return found;
  };

  /** @param {string} uploadId @param {number} number */
  const partPath = (uploadId, number) => join(store.uploads, uploadId, String(number).padStart(5, '0'));

  /** @param {string} uploadId */
  const parts = async (uploadId) => {
    const numbers = (await readdir(join(store.uploads, uploadId)))
      .filter((name) => /^\d{5}$/.test(name))
      .map(Number);
    const found = await Promise.all(
      numbers
        .sort((a, b) => a - b)
        .map(async (number) => ({ number, description: await describeStored(partPath(uploadId, number)) })),
    );
    return found.flatMap(({ number, description }) => (description ? [{ number, description }] : []));
  };

  return {
    /** @param {string} bucket @param {string} key @param {Record<string, string>} headers */
    create: async (bucket, key, headers) => {
      await store.placeOf(bucket, key);
      const uploadId = randomBytes(16).toString('hex');
      // Described before it is in its place, so a half-made one is never seen.
      const half = join(store.temporary, uploadId);
      await mkdir(half, { mode: 0o700 });
      await writeFile(
        join(half, 'about.json'),
        JSON.stringify({ bucket, key, headers, initiated: new Date().toISOString() }),
      );
      await rename(half, join(store.uploads, uploadId));
      return uploadId;
    },

    /**
     * @param {string} uploadId @param {string} bucket @param {string} key @param {number} number
     * @param {import('./store.mjs').Content} content
     */
    putPart: async (uploadId, bucket, key, number, { source, through, checksum }) => {
      await belonging(uploadId, bucket, key);
      if (!(Number.isInteger(number) && number >= 1 && number <= MOST_PARTS)) {
        throw new S3Error('InvalidArgument', 'The part number must be between 1 and 10000.');
      }
      const written = await writeTemporary(store.temporary, source, through);
      const description = describe(written.size, `"${written.md5}"`, {}, checksum());
      await belonging(uploadId, bucket, key).catch(async (error) => {
        await rm(written.path, { force: true });
        throw error;
      });
      await placeFile(written.path, partPath(uploadId, number), description, { durable: store.durable });
      return description;
    },

    /**
     * @param {string} uploadId @param {string} bucket @param {string} key
     * @param {{ number: number, etag: string }[]} wanted @param {{ onlyIfNew: boolean }} how
     */
    complete: async (uploadId, bucket, key, wanted, { onlyIfNew }) => {
      const { headers } = await belonging(uploadId, bucket, key);
      if (wanted.length === 0) throw new S3Error('MalformedXML', 'At least one part must be named.');
      if (wanted.some(({ number }, i) => i > 0 && number <= (wanted[i - 1]?.number ?? 0))) {
        throw new S3Error('InvalidPartOrder', 'The parts are not in ascending order.');
      }
      const md5 = createHash('md5');
      for (const [i, { number, etag }] of wanted.entries()) {
        const found = Number.isInteger(number) ? await describeStored(partPath(uploadId, number)) : null;
        if (!found || unquoted(found.etag) !== unquoted(etag))
          throw new S3Error('InvalidPart', `Part ${number} was not found as named.`);
        if (i < wanted.length - 1 && found.size < SMALLEST_PART_BYTES) {
          throw new S3Error('EntityTooSmall', 'Every part but the last must have 5 MiB or more.');
        }
        md5.update(Buffer.from(unquoted(found.etag), 'hex'));
      }
      const place = await store.placeOf(bucket, key);
      const written = await writeTemporary(
        store.temporary,
        joined(wanted.map(({ number }) => partPath(uploadId, number))),
        [],
      );
      const description = describe(written.size, `"${md5.digest('hex')}-${wanted.length}"`, headers, null);
      await placeFile(written.path, place, description, { onlyIfNew, durable: store.durable });
      await rm(join(store.uploads, uploadId), { recursive: true, force: true });
      return description;
    },

    /** @param {string} uploadId @param {string} bucket @param {string} key */
    abort: async (uploadId, bucket, key) => {
      await belonging(uploadId, bucket, key);
      await rm(join(store.uploads, uploadId), { recursive: true, force: true });
    },

    /** @param {string} uploadId @param {string} bucket @param {string} key */
    listParts: async (uploadId, bucket, key) => {
      await belonging(uploadId, bucket, key);
      return parts(uploadId);
    },

    /** @param {string} bucket @param {string} prefix */
    listUploads: async (bucket, prefix) => {
      await store.existing(bucket);
      const found = await Promise.all(
        (await readdir(store.uploads)).map(async (uploadId) => {
          const known = await about(uploadId).catch(() => null);
          return known ? [{ uploadId, ...known }] : [];
        }),
      );
      return found
        .flat()
        .filter((upload) => upload.bucket === bucket && upload.key.startsWith(prefix))
        .sort(
          (a, b) =>
            Buffer.compare(Buffer.from(a.key), Buffer.from(b.key)) || a.initiated.localeCompare(b.initiated),
        );
    },
  };
}

/** @param {string} etag */
function unquoted(etag) {
  return etag.replaceAll('"', '');
}

/** @param {string[]} paths @returns {AsyncGenerator<Buffer>} */
async function* joined(paths) {
  for (const path of paths) {
    const stored = await openStored(path);
    if (!stored) throw new S3Error('InvalidPart', 'A part went away while the upload was completed.');
    const { file, description } = stored;
    try {
      if (description.size > 0)
        yield* file.createReadStream({ start: 0, end: description.size - 1, autoClose: false });
    } finally {
      await file.close();
    }
  }
}
