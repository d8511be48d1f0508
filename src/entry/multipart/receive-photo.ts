import type { IncomingMessage } from 'node:http';
import type { Readable } from 'node:stream';
import Busboy from '@fastify/busboy';
import { ApiError } from '../../server/errors.ts';

/** Largest photo that is taken: a phone's largest are about half of it. */
export const PHOTO_LIMIT = 25 * 1024 * 1024;
const FORM_EXTRA = 64 * 1024;

export interface ReceivedPhoto {
  readonly fields: Readonly<Record<string, string>>;
  /** Null when no file came. */
  readonly bytes: Uint8Array | null;
}

const tooLarge = () =>
  new ApiError('too_large', {
    message: 'The photo is larger than 25 MiB. Nothing was kept.',
    hint: 'Take it with fewer megapixels, or send a smaller copy.',
  });

/** Refuses what cannot be a form or announces itself as too large, before a byte of it is read. */
export function checkPhotoForm(request: IncomingMessage): void {
  if (!/^multipart\/form-data\s*;.*boundary=/i.test(request.headers['content-type'] ?? '')) {
    throw new ApiError('wrong_media_type', { hint: 'Send multipart/form-data with the field "file".' });
  }
  if (Number(request.headers['content-length'] ?? 0) > PHOTO_LIMIT + FORM_EXTRA) throw tooLarge();
}

/** Takes a form with one picture into memory, fields in any order. */
export function receivePhoto(request: IncomingMessage): Promise<ReceivedPhoto> {
  const fields: Record<string, string> = {};
  const chunks: Buffer[] = [];
  let came = false;
  const form = Busboy({
    headers: { ...request.headers, 'content-type': request.headers['content-type'] ?? '' },
    limits: {
      files: 1,
      fileSize: PHOTO_LIMIT + 1,
      fields: 5,
      fieldSize: 8 * 1024,
      parts: 8,
      headerPairs: 50,
    },
  });
  return new Promise<ReceivedPhoto>((resolve, reject) => {
    const refuse = (error: ApiError) => {
      request.unpipe(form);
      reject(error);
    };
    const broken = () =>
      refuse(new ApiError('bad_request', { message: 'The photo broke off on its way. Nothing was kept.' }));
    form.on('field', (name, value, nameCut, valueCut) => {
      const wrong =
        nameCut || valueCut ? 'is too long' : Object.hasOwn(fields, name) ? 'is given twice' : null;
      if (wrong !== null) return refuse(invalid(name.slice(0, 40), wrong));
      fields[name] = value;
    });
    form.on('file', (name, stream: Readable) => {
      if (name !== 'file') {
        stream.resume();
        return refuse(invalid(name.slice(0, 40), 'is not a field for a photo; send it as "file"'));
      }
      came = true;
      stream.on('limit', () => refuse(tooLarge()));
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
    });
    form.on('filesLimit', () => refuse(invalid('file', 'one photo at a time')));
    form.on('partsLimit', () => refuse(invalid('', 'the form has too many parts')));
    form.on('fieldsLimit', () => refuse(invalid('', 'the form has too many fields')));
    form.on('error', broken);
    form.on('finish', () => resolve({ fields, bytes: came ? Buffer.concat(chunks) : null }));
    request.on('aborted', broken);
    request.on('error', broken);
    request.pipe(form);
  });
}

const invalid = (path: string, message: string) => new ApiError('invalid', { details: [{ path, message }] });
