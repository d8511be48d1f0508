import { windowQuery } from '../../contract/areas/captures.ts';
import { OPENERS } from '../../server/access.ts';
import { exerciseWindow } from '../../server/teaching/exercises/exercise-window.ts';
import { call } from '../call.ts';
import { readQuery } from '../query.ts';
import type { FrontRequest } from '../types.ts';

/** GET /exercises/{id}/window: samples under the exercise's own numbers. */
export async function exerciseWindowEndpoint(front: FrontRequest): Promise<void> {
  const { request, response, header, url, params } = front;
  const caller = await call(front, 'exercises.window');
  const row = await OPENERS.exercise(caller, 'exercises.window', params.id ?? '');
  const query = readQuery(windowQuery, url.searchParams);
  const { headers, body, version } = await exerciseWindow(row, caller, query);
  const etag = `"w${version}"`;
  const caching =
    query.v === undefined
      ? { 'Cache-Control': 'private, no-cache', ETag: etag }
      : { 'Cache-Control': 'private, max-age=31536000, immutable' };
  if (query.v === undefined && header('if-none-match') === etag) {
    response.writeHead(304, caching).end();
    return;
  }
  response.writeHead(200, {
    'Content-Type': 'application/octet-stream',
    'Content-Length': body.length,
    ...headers,
    ...caching,
  });
  response.end(request.method === 'HEAD' ? undefined : body);
}
