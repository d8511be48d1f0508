import { DeleteObjectCommand, DeleteObjectsCommand } from '@aws-sdk/client-s3';
import { fromStore } from './away.ts';
import { bucket, store } from './client.ts';

/** Removes an object; one that is not there is fine. */
export async function deleteObject(key: string): Promise<void> {
  await fromStore(() => store().send(new DeleteObjectCommand({ Bucket: bucket(), Key: key })));
}

/** Removes many objects, a thousand at a time as the protocol allows. */
export async function deleteObjects(keys: readonly string[]): Promise<void> {
  for (let at = 0; at < keys.length; at += 1000) {
    const Objects = keys.slice(at, at + 1000).map((Key) => ({ Key }));
    await fromStore(() =>
      store().send(new DeleteObjectsCommand({ Bucket: bucket(), Delete: { Objects, Quiet: true } })),
    );
  }
}
