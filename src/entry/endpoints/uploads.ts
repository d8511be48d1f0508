import type { EndpointId } from '../../contract/endpoints.ts';
import { beginUpload } from '../../server/captures/uploads/begin-upload.ts';
import { dropUpload } from '../../server/captures/uploads/drop-upload.ts';
import { findUpload, type UploadRecord } from '../../server/captures/uploads/find-upload.ts';
import { db } from '../../server/db/client.ts';
import { ApiError } from '../../server/errors.ts';
import { checkJob } from '../../server/jobs/check-job.ts';
import { call } from '../call.ts';
import { checkCreation } from '../tus/check-creation.ts';
import { beginsAs, finish, tus } from '../tus/tus-server.ts';
import type { FrontRequest } from '../types.ts';

type UploadsId = Extract<EndpointId, `uploads.${string}`>;

/**
 * tus 1.0 at /api/v1/uploads. Whose upload it is and what may be asked of it is checked here; the package moves the bytes. An
 * upload that is complete is answered here alone, so that its last answer can be asked for any number of times.
 */
export const uploadsEndpoint =
  (id: UploadsId) =>
  async (front: FrontRequest): Promise<void> => {
    const { request, response, header, params } = front;
    const caller = await call(front, id);
    response.setHeader('Cache-Control', 'no-store');
    if (id === 'uploads.options') return handle(front);
    if (header('tus-resumable') !== '1.0.0') {
      response.setHeader('Tus-Version', '1.0.0');
      throw new ApiError('stale', { message: 'This address speaks tus 1.0.0; say so in Tus-Resumable.' });
    }
    if (id === 'uploads.create') {
      const { length, metadata, fields } = checkCreation(header);
      await checkJob(db(), caller.workshopId, fields.jobId, caller.role === 'learner');
      beginsAs(request, await beginUpload(caller, length, metadata));
      return handle(front);
    }
    const row = await findUpload(caller, params.id ?? '');
    if (id === 'uploads.head') return head(front, row);
    if (id === 'uploads.delete') return remove(front, row);
    return patch(front, row);
  };

const handle = ({ request, response }: FrontRequest) => tus().server.handle(request, response);

async function head({ response }: FrontRequest, row: UploadRecord): Promise<void> {
  const offset = row.captureId === null ? await offsetOf(row.id) : row.length;
  const captureId = row.captureId ?? (offset === row.length ? await finish(tus().store, row) : null);
  response.writeHead(200, {
    'Tus-Resumable': '1.0.0',
    'Upload-Offset': offset,
    'Upload-Length': row.length,
    ...(captureId === null ? {} : { 'Gapmark-Capture': captureId }),
  });
  response.end();
}

/** How far an upload has come, when nobody writes to it. */
async function offsetOf(id: string): Promise<number> {
  return locked(id, async () => (await tus().store.getUpload(id)).offset);
}

async function patch(front: FrontRequest, row: UploadRecord): Promise<void> {
  const { request, response, header } = front;
  if (row.captureId !== null) return again(front, row, row.captureId);
  // Whether these are the last bytes, sent once more because the answer to them was lost before.
  const last = Number(header('upload-offset')) + Number(header('content-length')) >= row.length;
  if (last && (await offsetOf(row.id)) === row.length)
    return again(front, row, await finish(tus().store, row));
  try {
    await handle(front);
  } catch (error) {
    // The client went away while the answer was on its way.
    if (!request.destroyed && !response.headersSent) throw error;
    response.destroy();
  }
}

/** The last bytes once more: they are here already, so they are read and left, and the answer is what it was. */
async function again(
  { request, response }: FrontRequest,
  row: UploadRecord,
  captureId: string,
): Promise<void> {
  for await (const _ of request);
  response.writeHead(204, {
    'Tus-Resumable': '1.0.0',
    'Upload-Offset': row.length,
    'Gapmark-Capture': captureId,
  });
  response.end();
}

async function remove({ response }: FrontRequest, row: UploadRecord): Promise<void> {
  const gone = row.captureId === null && (await locked(row.id, () => dropUpload(row.id)));
  if (!gone) {
    throw new ApiError('conflict', {
      message: 'This upload is a capture already; delete the capture instead.',
    });
  }
  response.writeHead(204, { 'Tus-Resumable': '1.0.0' });
  response.end();
}

async function locked<T>(id: string, run: () => Promise<T>): Promise<T> {
  const lock = tus().locker.newLock(id);
  await lock.lock(AbortSignal.timeout(30_000), () => {});
  try {
    return await run();
  } catch (error) {
    // The package says "not there" with a plain object; a row without anything in the store began and got no further.
    if (!(error instanceof Error)) throw new ApiError('not_found', { cause: error });
    throw error;
  } finally {
    await lock.unlock();
  }
}
