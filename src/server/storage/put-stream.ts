import type { Readable } from 'node:stream';
import { Upload } from '@aws-sdk/lib-storage';
import { fromStore } from './away.ts';
import { bucket, store } from './client.ts';

const PART_BYTES = 5 * 1024 * 1024;

/**
 * Writes an object from a stream of any length, holding two parts of 5 MiB in memory at most. It becomes visible when the
 * stream has ended; when the stream breaks or `signal` fires, nothing is left.
 */
export async function putStream(key: string, body: Readable, signal?: AbortSignal): Promise<void> {
  const upload = new Upload({
    client: store(),
    params: { Bucket: bucket(), Key: key, Body: body, ContentType: 'application/octet-stream' },
    partSize: PART_BYTES,
    queueSize: 1,
  });
  const stop = () => void upload.abort().catch(() => {});
  signal?.addEventListener('abort', stop, { once: true });
  try {
    if (signal?.aborted) throw signal.reason;
    await fromStore(() => upload.done());
  } finally {
    signal?.removeEventListener('abort', stop);
  }
}
