import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { listPhotos } from '../../../../../server/jobs/photos/list-photos.ts';
import { photoJson } from '../../../../../server/jobs/photos/photo-json.ts';

export const GET = route('photos.list', async ({ opened }) =>
  reply({ items: (await listPhotos(opened.id)).map(photoJson), nextCursor: null }),
);
