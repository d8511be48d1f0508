import { windowQuery } from '../../contract/areas/captures.ts';
import { OPENERS } from '../../server/access.ts';
import { FROZEN_VERSION, knownGoodWindow } from '../../server/library/known-good-window.ts';
import { call } from '../call.ts';
import { readQuery } from '../query.ts';
import type { FrontRequest } from '../types.ts';

/** GET /known-goods/{id}/window: frozen samples, so an answer under the version may be kept for good. */
export async function knownGoodWindowEndpoint(front: FrontRequest): Promise<void> {
  const { request, response, header } = front;
  const caller = await call(front, 'knownGoods.window');
  const query = readQuery(windowQuery, front.url.searchParams);
  const row = await OPENERS.knownGood(caller, 'knownGoods.window', front.params.id ?? '');
  const etag = `"w${FROZEN_VERSION}"`;
  const caching =
    query.v === undefined
      ? { 'Cache-Control': 'private, no-cache', ETag: etag }
      : { 'Cache-Control': 'private, max-age=31536000, immutable' };
  if (query.v === undefined && header('if-none-match') === etag) {
    response.writeHead(304, caching).end();
    return;
  }
  const { headers, body } = await knownGoodWindow(row, query);
  response.writeHead(200, {
    'Content-Type': 'application/octet-stream',
    'Content-Length': body.length,
    ...headers,
    ...caching,
  });
  response.end(request.method === 'HEAD' ? undefined : body);
}
