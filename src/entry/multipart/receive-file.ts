import { createHash } from 'node:crypto';
import type { IncomingMessage } from 'node:http';
import { PassThrough, type Readable } from 'node:stream';
import Busboy from '@fastify/busboy';
import { cleanFileName } from '../../server/captures/title-of.ts';
import { ApiError } from '../../server/errors.ts';
import { putStream } from '../../server/storage/put-stream.ts';

/** Largest file that a form may carry. */
export const FORM_FILE_LIMIT = 32 * 1024 * 1024;
/** What the other fields and the form's own lines may add to that. */
const FORM_EXTRA = 256 * 1024;

export interface ReceivedForm {
  readonly fields: Readonly<Record<string, string>>;
  readonly file: { readonly name: string; readonly bytes: number; readonly sha256: string } | null;
}

export const tooLarge = () =>
  new ApiError('too_large', {
    hint: 'Files over 32 MiB go through the resumable upload at /api/v1/uploads (tus 1.0), as the pages do it.',
  });

/** Refuses what cannot be a form or announces itself as too large, before a byte of it is read. */
export function checkForm(request: IncomingMessage): void {
  if (!/^multipart\/form-data\s*;.*boundary=/i.test(request.headers['content-type'] ?? '')) {
    throw new ApiError('wrong_media_type', { hint: 'Send multipart/form-data with the field "file".' });
  }
  if (Number(request.headers['content-length'] ?? 0) > FORM_FILE_LIMIT + FORM_EXTRA) throw tooLarge();
}

/**
 * Takes a form in, fields in any order: the file streams to the store under `key` while its SHA-256 runs, and is there as a
 * whole when this ends. Throws as soon as the form is refused or breaks off; then no file is visible.
 */
export async function receiveForm(request: IncomingMessage, key: string): Promise<ReceivedForm> {
  const stop = new AbortController();
  const fields: Record<string, string> = {};
  let file: Promise<ReceivedForm['file']> | null = null;
  const contentType = request.headers['content-type'] ?? '';
  const form = Busboy({
    headers: { ...request.headers, 'content-type': contentType },
    limits: {
      files: 1,
      fileSize: FORM_FILE_LIMIT + 1,
      fields: 20,
      fieldSize: 64 * 1024,
      parts: 30,
      headerPairs: 50,
    },
  });
  const parsed = new Promise<void>((resolve, reject) => {
    const refuse = (error: unknown) => {
      stop.abort(error);
      reject(error);
    };
    const broken = () =>
      refuse(new ApiError('bad_request', { message: 'The upload broke off. Nothing was kept.' }));
    form.on('field', (name, value, nameCut, valueCut) => {
      if (nameCut || valueCut) return refuse(invalid(name.slice(0, 40), 'is too long'));
      if (Object.hasOwn(fields, name)) return refuse(invalid(name.slice(0, 40), 'is given twice'));
      fields[name] = value;
    });
    form.on('file', (name, stream, fileName) => {
      if (name !== 'file') {
        stream.resume();
        return refuse(invalid(name.slice(0, 40), 'is not a field for a file; send it as "file"'));
      }
      stream.on('limit', () => refuse(tooLarge()));
      file = store(stream, key, cleanFileName(fileName), stop.signal);
      file.catch(refuse);
    });
    form.on('filesLimit', () => refuse(invalid('file', 'one file at a time')));
    form.on('partsLimit', () => refuse(invalid('', 'the form has too many parts')));
    form.on('fieldsLimit', () => refuse(invalid('', 'the form has too many fields')));
    form.on('error', broken);
    form.on('finish', () => resolve());
    request.on('aborted', broken);
    request.on('error', broken);
  });
  request.pipe(form);
  try {
    await parsed;
    return { fields, file: await file };
  } catch (error) {
    request.unpipe(form);
    stop.abort(error);
    await (file as Promise<unknown> | null)?.catch(() => {});
    throw error;
  }
}

async function store(
  source: Readable,
  key: string,
  name: string,
  signal: AbortSignal,
): Promise<ReceivedForm['file']> {
  const hash = createHash('sha256');
  const body = new PassThrough({ highWaterMark: 256 * 1024 });
  let bytes = 0;
  source.on('data', (chunk: Buffer) => {
    bytes += chunk.length;
    hash.update(chunk);
  });
  source.on('error', (error) => body.destroy(error));
  source.pipe(body);
  await putStream(key, body, signal);
  return { name, bytes, sha256: hash.digest('hex') };
}

const invalid = (path: string, message: string) => new ApiError('invalid', { details: [{ path, message }] });
