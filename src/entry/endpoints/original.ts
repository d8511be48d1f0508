import { pipeline } from 'node:stream/promises';
import { OPENERS } from '../../server/access.ts';
import { getObject } from '../../server/storage/get-object.ts';
import { attachment } from '../attachment.ts';
import { call } from '../call.ts';
import type { FrontRequest } from '../types.ts';

/** GET /captures/{id}/original: the uploaded bytes, never shown by a browser, only saved. */
export async function originalEndpoint(front: FrontRequest): Promise<void> {
  const caller = await call(front, 'captures.original');
  const row = await OPENERS.capture(caller, 'captures.original', front.params.id ?? '');
  const { body, length } = await getObject(row.originalKey);
  front.response.writeHead(200, {
    'Content-Type': 'application/octet-stream',
    'Content-Length': length,
    'Content-Disposition': attachment(row.fileName),
    'Cache-Control': 'private, no-store',
    'Content-Security-Policy': "sandbox; default-src 'none'",
  });
  // A client that goes away in the middle is no fault.
  await pipeline(body, front.response).catch(() => front.response.destroy());
}
