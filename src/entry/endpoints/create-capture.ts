import { uploadFields } from '../../contract/areas/captures.ts';
import { beginUpload } from '../../server/captures/uploads/begin-upload.ts';
import { dropUpload } from '../../server/captures/uploads/drop-upload.ts';
import { finishUpload } from '../../server/captures/uploads/finish-upload.ts';
import { ApiError } from '../../server/errors.ts';
import { hashMultipart, idempotencyKey, runIdempotent } from '../../server/http/idempotency.ts';
import type { PlainAnswer } from '../../server/http/respond.ts';
import { validate } from '../../server/http/validate.ts';
import { log } from '../../server/log.ts';
import { call } from '../call.ts';
import { checkForm, receiveForm } from '../multipart/receive-file.ts';
import { send } from '../send.ts';
import type { FrontRequest } from '../types.ts';

/**
 * POST /captures. The upload's row stands before the first byte and names the object, so whatever breaks off on the way is
 * known to the sweep; it becomes the capture's original when all is well, and goes otherwise.
 */
export async function createCaptureEndpoint(front: FrontRequest): Promise<void> {
  const { request, response, header, url } = front;
  const caller = await call(front, 'captures.create');
  checkForm(request);
  const key = idempotencyKey(header('idempotency-key'));
  const uploadId = await beginUpload(caller, 0, {});
  const keep = async (form: Awaited<ReturnType<typeof receiveForm>>): Promise<PlainAnswer> => {
    if (form.file === null) throw new ApiError('no_file');
    if (form.file.bytes === 0) throw new ApiError('empty_file');
    const fields = validate(uploadFields, form.fields);
    const { bytes, sha256, name } = form.file;
    const id = await finishUpload(uploadId, { bytes, sha256, fields, fileName: name });
    return {
      status: 201,
      headers: {
        'Content-Type': 'application/json; charset=utf-8',
        'Cache-Control': 'no-store',
        Location: `/api/v1/captures/${id}`,
      },
      body: JSON.stringify({ id, status: 'queued' }),
    };
  };
  try {
    const form = await receiveForm(request, uploadId);
    const path = `POST ${url.pathname}`;
    const contentHash = hashMultipart(form.fields, form.file === null ? {} : { file: form.file.sha256 });
    const answer =
      key === undefined
        ? await keep(form)
        : await runIdempotent({ caller, path, key, contentHash }, () => keep(form));
    send(response, answer);
  } finally {
    // Leaves alone what became a capture, also when the database's answer to that was lost.
    await dropUpload(uploadId).catch((error: unknown) => {
      log.warn({ err: error, requestId: front.requestId, upload: uploadId }, 'left to the sweep');
    });
  }
}
