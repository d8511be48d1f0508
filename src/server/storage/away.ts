import { NoSuchKey, NotFound, S3ServiceException } from '@aws-sdk/client-s3';
import { ApiError } from '../errors.ts';
import { isServiceAway } from '../http/service-away.ts';

/** Whether the store said that the object is not there. */
export function isMissing(error: unknown): boolean {
  return (
    error instanceof NoSuchKey ||
    error instanceof NotFound ||
    (error instanceof S3ServiceException && error.$metadata.httpStatusCode === 404)
  );
}

/** Whether the store could not be reached or could not answer. */
export function isStoreAway(error: unknown): boolean {
  if (isServiceAway(error)) return true;
  return error instanceof S3ServiceException && (error.$metadata.httpStatusCode ?? 0) >= 500;
}

/** Runs a call to the store; when it is away, that is the API's 503 and not a fault of ours. */
export async function fromStore<T>(call: () => Promise<T>): Promise<T> {
  try {
    return await call();
  } catch (error) {
    if (isStoreAway(error)) throw new ApiError('service_away', { cause: error, retryAfterS: 5 });
    throw error;
  }
}
