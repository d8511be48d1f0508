import type { IncomingMessage } from 'node:http';
import { Server, type Upload } from '@tus/server';
import { finishUpload } from '../../server/captures/uploads/finish-upload.ts';
import { config } from '../../server/config.ts';
import { ApiError } from '../../server/errors.ts';
import { toApiError } from '../../server/http/respond.ts';
import { isStoreAway } from '../../server/storage/away.ts';
import { UploadLocker } from './upload-locker.ts';
import { UploadStore } from './upload-store.ts';

export const UPLOADS_PATH = '/api/v1/uploads';

export interface Tus {
  readonly server: Server;
  readonly store: UploadStore;
  readonly locker: UploadLocker;
}

/** The id of the row that was made for a request that begins an upload. */
const begun = new WeakMap<object, string>();

/** Tells the package under which id the upload of this request begins. */
export const beginsAs = (request: IncomingMessage, id: string) => void begun.set(request, id);

let made: Tus | undefined;

/** The package's server, set so that it answers only what our own checks let through. */
export function tus(): Tus {
  made ??= make();
  return made;
}

function make(): Tus {
  const store = new UploadStore();
  const locker = new UploadLocker();
  const server = new Server({
    path: UPLOADS_PATH,
    datastore: store,
    locker,
    relativeLocation: true,
    respectForwardedHeaders: false,
    allowedOrigins: () => false,
    maxSize: config().uploadLimitBytes,
    disableTerminationForFinishedUploads: true,
    lockDrainTimeout: 1_000,
    namingFunction: (request) => begun.get(request.runtime?.node?.req ?? {}) ?? '',
    onUploadFinish: async (_request, upload) => ({
      headers: { 'Gapmark-Capture': await finish(store, upload) },
    }),
    onResponseError: (_request, error) => refusal(error),
  });
  return { server, store, locker };
}

/** Makes the capture of an upload that is complete, or gives the one that was made. */
export async function finish(store: UploadStore, upload: Pick<Upload, 'id'>): Promise<string> {
  const captureId = await finishUpload(upload.id);
  await store.forget(upload.id).catch(() => {});
  return captureId;
}

function refusal(error: Error | { status_code: number; body: string }) {
  // The package's own refusals are plain objects that say their status.
  if (!(error instanceof Error)) return undefined;
  const told = isStoreAway(error) ? new ApiError('service_away', { cause: error }) : toApiError(error);
  return { status_code: told.status, body: JSON.stringify(told.toBody()) };
}
