// @ts-check
import { mkdirSync, rmSync } from 'node:fs';
import { access, mkdir, readdir, rm, rmdir, stat } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { pathOfKey } from './key-path.mjs';
import { listKeys } from './list-keys.mjs';
import { S3Error } from './s3-error.mjs';
import { describeStored, openStored, placeFile, writeTemporary } from './stored-file.mjs';

/**
 * Buckets and objects on disk: `buckets/<bucket>/<key as a path>`, `uploads/` for parts, `temporary/` for what is not
 * whole yet (emptied at the start: nobody waits for it any more).
 *
 * @typedef {import('./stored-file.mjs').Description} Description
 * @typedef {{ source: AsyncIterable<Buffer> | import('node:stream').Readable, through: import('node:stream').Transform[],
 *   checksum: () => Description['checksum'] }} Content
 * @typedef {ReturnType<typeof openStore>} Store
 */

const LONGEST_KEY_BYTES = 1024;

/** @param {string} folder @param {{ durable: boolean }} options */
export function openStore(folder, { durable }) {
  const temporary = join(folder, 'temporary');
  rmSync(temporary, { recursive: true, force: true });
  for (const name of ['temporary', 'buckets', 'uploads'])
    mkdirSync(join(folder, name), { recursive: true, mode: 0o700 });

  /** @param {string} bucket */
  const bucketFolder = (bucket) => {
    if (!/^[a-z0-9][a-z0-9.-]{1,61}[a-z0-9]$/.test(bucket))
      throw new S3Error('InvalidBucketName', 'The bucket name is not valid.');
    return join(folder, 'buckets', bucket);
  };

  /** @param {string} bucket */
  const existing = async (bucket) => {
    const path = bucketFolder(bucket);
    await access(path).catch(() => {
      throw new S3Error('NoSuchBucket', `There is no bucket ${bucket}.`);
    });
    return path;
  };

  /** @param {string} bucket @param {string} key */
  const placeOf = async (bucket, key) => {
    if (Buffer.byteLength(key) > LONGEST_KEY_BYTES)
      throw new S3Error('KeyTooLongError', 'The key is longer than 1024 bytes.');
    return join(await existing(bucket), pathOfKey(key));
  };

  return {
    durable,
    temporary,
    uploads: join(folder, 'uploads'),
    existing,
    placeOf,

    buckets: async () => {
      const names = (await readdir(join(folder, 'buckets'))).sort();
      return Promise.all(
        names.map(async (name) => ({
          name,
          created: (await stat(join(folder, 'buckets', name))).birthtime.toISOString(),
        })),
      );
    },

    /** @param {string} bucket */
    createBucket: async (bucket) => {
      await mkdir(bucketFolder(bucket), { mode: 0o700 }).catch((error) => {
        if (error.code === 'EEXIST')
          throw new S3Error('BucketAlreadyOwnedByYou', 'You have this bucket already.');
        throw error;
      });
    },

    /** @param {string} bucket */
    deleteBucket: async (bucket) => {
      await rmdir(await existing(bucket)).catch((error) => {
        if (error.code === 'ENOTEMPTY')
          throw new S3Error('BucketNotEmpty', 'The bucket still holds objects.');
        throw error;
      });
    },

    /**
     * @param {string} bucket @param {string} key @param {Content} content @param {Record<string, string>} headers
     * @param {{ onlyIfNew?: boolean }} how
     * @returns {Promise<Description>}
     */
    put: async (bucket, key, { source, through, checksum }, headers, { onlyIfNew = false }) => {
      const place = await placeOf(bucket, key);
      const written = await writeTemporary(temporary, source, through);
      const description = describe(written.size, `"${written.md5}"`, headers, checksum());
      await placeFile(written.path, place, description, { onlyIfNew, durable });
      return description;
    },

    /** @param {string} bucket @param {string} key */
    open: async (bucket, key) => {
      const stored = await openStored(await placeOf(bucket, key));
      if (!stored) throw new S3Error('NoSuchKey', 'The specified key does not exist.');
      return stored;
    },

    /** Removing what is not there is no fault. @param {string} bucket @param {string} key */
    remove: async (bucket, key) => {
      const top = await existing(bucket);
      const place = await placeOf(bucket, key);
      await rm(place, { force: true });
      // Folders left empty go too, from the inside out; one that is in use stays, and ends it.
      for (let at = dirname(place); at !== top; at = dirname(at)) {
        if (
          !(await rmdir(at).then(
            () => true,
            (error) => error.code === 'ENOENT',
          ))
        )
          break;
      }
    },

    /**
     * One page of keys; with a delimiter, the keys that share what comes up to it are one common prefix.
     * @param {string} bucket
     * @param {{ prefix: string, delimiter: string, after: string, limit: number }} options
     */
    list: async (bucket, { prefix, delimiter, after, limit }) => {
      const top = await existing(bucket);
      /** @type {{ key: string, description: Description }[]} */
      const contents = [];
      /** @type {string[]} */
      const prefixes = [];
      let last = '';
      let startAfter = after;
      for (;;) {
        let jumped = false;
        for await (const { key, path } of listKeys(top, { prefix, after: startAfter })) {
          const cut = delimiter === '' ? -1 : key.indexOf(delimiter, prefix.length);
          const common = cut < 0 ? null : key.slice(0, cut + delimiter.length);
          // A page that ended with a common prefix is continued after all of its keys.
          const seen = common !== null && common === after;
          if (!seen && contents.length + prefixes.length >= limit) return { contents, prefixes, next: last };
          if (common !== null) {
            if (!seen) prefixes.push(common);
            last = common;
            startAfter = `${common}\u{10FFFF}`;
            jumped = true;
            break;
          }
          const description = await describeStored(path);
          if (!description) continue; // removed meanwhile
          contents.push({ key, description });
          last = key;
        }
        if (!jumped) return { contents, prefixes, next: null };
      }
    },
  };
}

/**
 * @param {number} size @param {string} etag @param {Record<string, string>} headers @param {Description['checksum']} checksum
 * @returns {Description}
 */
export function describe(size, etag, headers, checksum) {
  return { size, etag, modified: new Date().toISOString(), headers, checksum };
}
