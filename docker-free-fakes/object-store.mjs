// @ts-check
import { createServer } from 'node:http';
import { runAlone } from '../scripts/lib/run-alone.mjs';
import { serveChild } from '../scripts/lib/serve-child.mjs';
import { startServiceProcess } from '../scripts/lib/start-service-process.mjs';
import { makeHandler } from './object-store/handle.mjs';
import { openStore } from './object-store/store.mjs';

/**
 * An S3-compatible object store of Node built-ins on loopback: signature version 4, files on disk. It stands where a
 * hosted one stands in production; the product reaches both through the same SDK and the same settings.
 */

const BUCKET = 'gapmark';
const REGION = 'us-east-1';

/**
 * The server inside this process, for its tests and for the process below.
 * @param {{ folder: string, port: number, credentials: import('./object-store/signature.mjs').Credentials,
 *   bucket?: string, durable?: boolean }} options
 */
export async function serveObjectStore({ folder, port, credentials, bucket, durable = true }) {
  const store = openStore(folder, { durable });
  if (bucket !== undefined)
    await store.createBucket(bucket).catch((error) => {
      if (error.code !== 'BucketAlreadyOwnedByYou') throw error;
    });
  const handle = makeHandler(store, credentials);
  // A slow upload is a normal upload: only the headers are given a time.
  const server = createServer(
    { requestTimeout: 0, headersTimeout: 30_000, keepAliveTimeout: 65_000 },
    (request, response) => {
      void handle(request, response);
    },
  );
  await new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', () => resolve(undefined));
  });
  return server;
}

/**
 * The store as a process of its own.
 * @param {import('../scripts/lib/instance.mjs').Instance} instance
 * @param {{ say: import('../scripts/lib/say.mjs').Say, durable?: boolean }} options
 */
export async function startObjectStore(instance, { say, durable = true }) {
  const { storeAccessKeyId, storeSecretAccessKey } = instance.secrets;
  const { ports, program } = await startServiceProcess(instance, {
    name: 'object store',
    file: import.meta.filename,
    env: {
      STORE_FOLDER: instance.folder('objects'),
      STORE_ACCESS_KEY_ID: storeAccessKeyId,
      STORE_SECRET_ACCESS_KEY: storeSecretAccessKey,
      STORE_DURABLE: durable ? 'yes' : 'no',
    },
    say,
  });
  return {
    program,
    env: {
      S3_ENDPOINT: `http://127.0.0.1:${ports.store}`,
      S3_REGION: REGION,
      S3_BUCKET: BUCKET,
      S3_ACCESS_KEY_ID: storeAccessKeyId,
      S3_SECRET_ACCESS_KEY: storeSecretAccessKey,
    },
  };
}

if (import.meta.filename === process.argv[1]) {
  if (process.env.STORE_FOLDER === undefined) {
    await runAlone(async (instance, say) => {
      const { env } = await startObjectStore(instance, { say });
      return env;
    });
  } else {
    const credentials = {
      accessKeyId: process.env.STORE_ACCESS_KEY_ID ?? '',
      secretAccessKey: process.env.STORE_SECRET_ACCESS_KEY ?? '',
      region: REGION,
    };
    await serveChild(async (/** @type {Record<string, number>} */ ports) => ({
      store: await serveObjectStore({
        folder: process.env.STORE_FOLDER ?? '',
        port: ports.store ?? 0,
        credentials,
        bucket: BUCKET,
        durable: process.env.STORE_DURABLE !== 'no',
      }),
    }));
  }
}
