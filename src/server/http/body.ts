import { ApiError } from '../errors.ts';

export const JSON_BODY_LIMIT = 1024 * 1024;

const tooLarge = () =>
  new ApiError('too_large', { message: 'The body is larger than 1 MiB. Nothing was kept.' });

/** Reads a JSON body of at most 1 MiB: 415 for another media type, 413 when larger, 400 when it is not JSON. */
export async function readJson(request: Request): Promise<unknown> {
  const mediaType = (request.headers.get('content-type') ?? '').split(';')[0]?.trim().toLowerCase();
  if (mediaType !== 'application/json') {
    throw new ApiError('wrong_media_type', { hint: 'Send JSON with Content-Type: application/json.' });
  }
  if (Number(request.headers.get('content-length') ?? 0) > JSON_BODY_LIMIT) throw tooLarge();
  const text = await readText(request);
  try {
    return JSON.parse(text) as unknown;
  } catch {
    throw new ApiError('unreadable_body');
  }
}

async function readText(request: Request): Promise<string> {
  if (request.body === null) return '';
  const chunks: Uint8Array[] = [];
  let bytes = 0;
  for await (const chunk of request.body) {
    bytes += chunk.byteLength;
    if (bytes > JSON_BODY_LIMIT) throw tooLarge();
    chunks.push(chunk);
  }
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(Buffer.concat(chunks));
  } catch {
    throw new ApiError('unreadable_body', { message: 'The body is not UTF-8.' });
  }
}
