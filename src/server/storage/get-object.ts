import { Readable } from 'node:stream';
import { GetObjectCommand } from '@aws-sdk/client-s3';
import { ApiError } from '../errors.ts';
import { log } from '../log.ts';
import { fromStore, isMissing } from './away.ts';
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
  const Range = range === undefined ? undefined : `bytes=${range.from}-${range.to - 1}`;
  const answer = await fromStore(() =>
    store().send(new GetObjectCommand({ Bucket: bucket(), Key: key, Range })),
  ).catch((error: unknown) => {
    if (!isMissing(error)) throw error;
    log.error({ key }, 'an object that a row names is not in the store');
    throw new ApiError('not_found', { message: 'The data of this is no longer in the store.', cause: error });
  });
  if (!(answer.Body instanceof Readable)) throw new Error(`The store gave no body for ${key}`);
  return { body: answer.Body, length: answer.ContentLength ?? 0 };
}
