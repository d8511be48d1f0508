import { Readable } from 'node:stream';
import { GetObjectCommand } from '@aws-sdk/client-s3';
import { fromStore } from './away.ts';
import { bucket, store } from './client.ts';

export interface StoredObject {
  readonly body: Readable;
  readonly length: number;
}

/** Opens an object for reading, from `from` on and up to (not including) `to` where they are given. */
export async function getObject(
  key: string,
  range?: { readonly from: number; readonly to: number },
): Promise<StoredObject> {
  const answer = await fromStore(() =>
    store().send(
      new GetObjectCommand({
        Bucket: bucket(),
        Key: key,
        ...(range === undefined ? {} : { Range: `bytes=${range.from}-${range.to - 1}` }),
      }),
    ),
  );
  if (!(answer.Body instanceof Readable)) throw new Error(`The store gave no body for ${key}`);
  return { body: answer.Body, length: answer.ContentLength ?? 0 };
}
