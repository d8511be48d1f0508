import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { photoJson } from '../../../../../server/jobs/photos/photo-json.ts';
import { restorePhoto } from '../../../../../server/jobs/photos/restore-photo.ts';

export const POST = route('photos.restore', async ({ opened }) => {
  const json = photoJson(await restorePhoto(opened));
  return reply(json, { etag: json.etag });
});
