import { CreateBucketCommand, HeadBucketCommand, S3ServiceException } from '@aws-sdk/client-s3';
import { fromStore, isMissing } from './away.ts';
import { bucket, store } from './client.ts';

/** Makes the bucket when it is not there. Two processes may do it at once. */
export async function ensureBucket(): Promise<void> {
  await fromStore(async () => {
    try {
      await store().send(new HeadBucketCommand({ Bucket: bucket() }));
      return;
    } catch (error) {
      if (!isMissing(error)) throw error;
    }
    try {
      await store().send(new CreateBucketCommand({ Bucket: bucket() }));
    } catch (error) {
      const there = error instanceof S3ServiceException && /^BucketAlready/.test(error.name);
      if (!there) throw error;
    }
  });
}
