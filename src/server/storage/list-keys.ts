import { paginateListObjectsV2 } from '@aws-sdk/client-s3';
import { fromStore } from './away.ts';
import { bucket, store } from './client.ts';

/** Every key that begins with `prefix`. */
export async function listKeys(prefix: string): Promise<string[]> {
  return fromStore(async () => {
    const keys: string[] = [];
    const pages = paginateListObjectsV2({ client: store() }, { Bucket: bucket(), Prefix: prefix });
    for await (const page of pages) {
      for (const item of page.Contents ?? []) if (item.Key !== undefined) keys.push(item.Key);
    }
    return keys;
  });
}
