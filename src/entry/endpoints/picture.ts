import { ENDPOINTS } from '../../contract/endpoints.ts';
import { OPENERS } from '../../server/access.ts';
import { capturePicture } from '../../server/captures/picture/capture-picture.ts';
import { attachment } from '../attachment.ts';
import { call } from '../call.ts';
import { readQuery } from '../query.ts';
import type { FrontRequest } from '../types.ts';

/** GET /captures/{id}/picture: saved, never shown as a page of ours. */
export async function pictureEndpoint(front: FrontRequest): Promise<void> {
  const caller = await call(front, 'captures.picture');
  const row = await OPENERS.capture(caller, 'captures.picture', front.params.id ?? '');
  const query = readQuery(ENDPOINTS['captures.picture'].query, front.url.searchParams);
  const { contentType, body } = await capturePicture(row, query);
  front.response.writeHead(200, {
    'Content-Type': contentType,
    'Content-Length': body.length,
    'Content-Disposition': attachment(`${row.title || 'capture'}.${query.format}`),
    'Cache-Control': 'private, no-store',
    'Content-Security-Policy': "sandbox; default-src 'none'; style-src 'unsafe-inline'; font-src data:",
  });
  front.response.end(front.request.method === 'HEAD' ? undefined : body);
}
