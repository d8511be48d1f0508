import { createHash } from 'node:crypto';
import { photoFields } from '../../contract/areas/jobs.ts';
import { OPENERS } from '../../server/access.ts';
import { ApiError } from '../../server/errors.ts';
import { hashMultipart, idempotencyKey, runIdempotent } from '../../server/http/idempotency.ts';
import type { PlainAnswer } from '../../server/http/respond.ts';
import { validate } from '../../server/http/validate.ts';
import { addPhoto } from '../../server/jobs/photos/add-photo.ts';
import { photoJson } from '../../server/jobs/photos/photo-json.ts';
import { call } from '../call.ts';
import { checkPhotoForm, type ReceivedPhoto, receivePhoto } from '../multipart/receive-photo.ts';
import { send } from '../send.ts';
import type { FrontRequest } from '../types.ts';

/** POST /jobs/{id}/photos: the job is opened before a byte of the picture is read. */
export async function createPhotoEndpoint(front: FrontRequest): Promise<void> {
  const { request, response, header, url, params } = front;
  const caller = await call(front, 'photos.create');
  const job = await OPENERS.job(caller, 'photos.create', params.id ?? '');
  checkPhotoForm(request);
  const key = idempotencyKey(header('idempotency-key'));
  const keep = async ({ fields, bytes }: ReceivedPhoto): Promise<PlainAnswer> => {
    if (bytes === null) throw new ApiError('no_file');
    if (bytes.length === 0) throw new ApiError('empty_file');
    const json = photoJson(await addPhoto(caller, job, bytes, validate(photoFields, fields)));
    const headers = { 'Content-Type': 'application/json; charset=utf-8', 'Cache-Control': 'no-store' };
    return { status: 201, headers: { ...headers, ETag: json.etag }, body: JSON.stringify(json) };
  };
  const form = await receivePhoto(request);
  if (key === undefined) return send(response, await keep(form));
  const sha256 = createHash('sha256')
    .update(form.bytes ?? '')
    .digest('hex');
  const contentHash = hashMultipart(form.fields, { file: sha256 });
  send(
    response,
    await runIdempotent({ caller, path: `POST ${url.pathname}`, key, contentHash }, () => keep(form)),
  );
}
