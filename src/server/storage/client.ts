import { S3Client, type S3ClientConfig } from '@aws-sdk/client-s3';
import { config } from '../config.ts';

/**
 * How every client of the store is made. Checksums only where the protocol asks for them: the SDK's default puts the sum
 * of an empty body into signed addresses. A store that is away is noticed in seconds, not minutes.
 */
export function storeSettings(): S3ClientConfig {
  process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED = 'true';
  const { endpoint, region, accessKeyId, secretAccessKey } = config().store;
  return {
    ...(endpoint === undefined ? {} : { endpoint }),
    region,
    credentials: { accessKeyId, secretAccessKey },
    forcePathStyle: true,
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    maxAttempts: 3,
    requestHandler: { connectionTimeout: 3_000, socketTimeout: 30_000, httpAgent: { maxSockets: 64 } },
  };
}

let client: S3Client | undefined;

/** The process's client. */
export function store(): S3Client {
  client ??= new S3Client(storeSettings());
  return client;
}

export const bucket = (): string => config().store.bucket;

export function closeStore(): void {
  client?.destroy();
  client = undefined;
}
