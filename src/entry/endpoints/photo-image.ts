import { pipeline } from 'node:stream/promises';
import { ENDPOINTS } from '../../contract/endpoints.ts';
import { OPENERS } from '../../server/access.ts';
import { getObject } from '../../server/storage/get-object.ts';
import { photoKey, smallPhotoKey } from '../../server/storage/keys.ts';
import { call } from '../call.ts';
import { readQuery } from '../query.ts';
import type { FrontRequest } from '../types.ts';

/** GET /photos/{id}/image: what was written anew, which never changes under its id. */
export async function photoImageEndpoint(front: FrontRequest): Promise<void> {
  const caller = await call(front, 'photos.image');
  const row = await OPENERS.photo(caller, 'photos.image', front.params.id ?? '');
  const { size } = readQuery(ENDPOINTS['photos.image'].query, front.url.searchParams);
  const small = size === 'small';
  const { body, length } = await getObject(small ? smallPhotoKey(row.id) : photoKey(row.id));
  front.response.writeHead(200, {
    'Content-Type': small ? 'image/jpeg' : row.contentType,
    'Content-Length': length,
    'Content-Disposition': 'inline',
    'Cache-Control': 'private, max-age=86400, immutable',
    'Content-Security-Policy': "sandbox; default-src 'none'",
  });
  // A client that goes away in the middle is no fault.
  await pipeline(body, front.response).catch(() => front.response.destroy());
}
