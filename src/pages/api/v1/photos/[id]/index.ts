import { nothing, reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { deletePhoto } from '../../../../../server/jobs/photos/delete-photo.ts';
import { patchPhoto } from '../../../../../server/jobs/photos/patch-photo.ts';
import { photoJson } from '../../../../../server/jobs/photos/photo-json.ts';

export const PATCH = route('photos.patch', async ({ opened, body, ifMatch }) => {
  const json = photoJson(await patchPhoto(opened, body.caption, ifMatch));
  return reply(json, { etag: json.etag });
});

export const DELETE = route('photos.delete', async ({ opened }) => {
  await deletePhoto(opened);
  return nothing;
});
