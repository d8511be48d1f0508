import { PutObjectCommand } from '@aws-sdk/client-s3';
import { fromStore } from './away.ts';
import { bucket, store } from './client.ts';

/** Writes an object from memory. It is visible as a whole or not at all. */
export async function putObject(key: string, body: Uint8Array, contentType = 'application/octet-stream') {
  await fromStore(() =>
    store().send(new PutObjectCommand({ Bucket: bucket(), Key: key, Body: body, ContentType: contentType })),
  );
}
