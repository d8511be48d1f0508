import { createWriteStream } from 'node:fs';
import type { IncomingMessage } from 'node:http';
import { pipeline } from 'node:stream/promises';
import Busboy from '@fastify/busboy';
import { ApiError } from '../../server/errors.ts';

/**
 * Takes the one file of a form, in the field "file", into a file on disk, for what must be read from its end. Throws when it
 * is refused, too large or breaks off; the caller removes the file.
 */
export async function receiveToDisk(
  request: IncomingMessage,
  path: string,
  limitBytes: number,
): Promise<void> {
  const contentType = request.headers['content-type'] ?? '';
  if (!/^multipart\/form-data\s*;.*boundary=/i.test(contentType))
    throw new ApiError('wrong_media_type', { hint: 'Send multipart/form-data with the field "file".' });
  const tooLarge = () =>
    new ApiError('too_large', { hint: 'The largest upload is set by whoever runs this server.' });
  if (Number(request.headers['content-length'] ?? 0) > limitBytes + 64 * 1024) throw tooLarge();
  const form = Busboy({
    headers: { ...request.headers, 'content-type': contentType },
    limits: { files: 1, fileSize: limitBytes + 1, fields: 4, fieldSize: 1_000, parts: 6, headerPairs: 50 },
  });
  let file: Promise<void> | null = null;
  await new Promise<void>((resolve, reject) => {
    const broken = () =>
      reject(new ApiError('bad_request', { message: 'The upload broke off. Nothing was kept.' }));
    form.on('file', (name, stream) => {
      if (name !== 'file') {
        stream.resume();
        return;
      }
      stream.on('limit', () => reject(tooLarge()));
      file = pipeline(stream, createWriteStream(path, { mode: 0o600, flags: 'wx' }));
      file.catch(reject);
    });
    form.on('error', broken);
    form.on('finish', () => resolve());
    request.on('aborted', broken);
    request.on('error', broken);
    request.pipe(form);
  }).finally(() => request.unpipe(form));
  if (file === null) throw new ApiError('no_file');
  await file;
}
