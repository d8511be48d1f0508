import { S3Store } from '@tus/s3-store';
import type { Upload } from '@tus/server';
import { config } from '../../server/config.ts';
import { ApiError } from '../../server/errors.ts';
import { isStoreAway } from '../../server/storage/away.ts';
import { storeSettings } from '../../server/storage/client.ts';

/**
 * The upload package's store on our bucket. Tags are off, lengths must be known, and a store that is away is told apart from
 * an upload that is not there: a client that hears 404 throws away what it has sent.
 */
export class UploadStore extends S3Store {
  constructor() {
    super({
      s3ClientConfig: { ...storeSettings(), bucket: config().store.bucket },
      useTags: false,
      partSize: 8 * 1024 * 1024,
      maxConcurrentPartUploads: 4,
    });
    this.extensions = ['creation', 'creation-with-upload', 'termination'];
  }

  override async getUpload(id: string): Promise<Upload> {
    try {
      await this.getMetadata(id);
    } catch (cause) {
      if (isStoreAway(cause)) throw new ApiError('service_away', { cause, retryAfterS: 5 });
    }
    return super.getUpload(id);
  }

  /** What the package keeps beside the object is of no use once the upload is a capture. */
  async forget(id: string): Promise<void> {
    await this.clearCache(id);
    await this.client.deleteObject({ Bucket: this.bucket, Key: this.infoKey(id) });
  }
}
