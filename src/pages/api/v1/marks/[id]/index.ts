import { personOf } from '../../../../../server/access.ts';
import { deleteMark } from '../../../../../server/captures/marks/delete-mark.ts';
import { markJson } from '../../../../../server/captures/marks/mark-json.ts';
import { patchMark } from '../../../../../server/captures/marks/patch-mark.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { nothing, reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const PATCH = route('marks.patch', async ({ caller, opened, body, ifMatch }) => {
  const changed = await patchMark(opened, body, ifMatch, personOf(caller));
  return reply(markJson(changed), { etag: etagOf(changed.edition) });
});

export const DELETE = route('marks.delete', async ({ opened }) => {
  await deleteMark(opened);
  return nothing;
});
