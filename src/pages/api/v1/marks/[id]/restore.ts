import { markJson } from '../../../../../server/captures/marks/mark-json.ts';
import { restoreMark } from '../../../../../server/captures/marks/restore-mark.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const POST = route('marks.restore', async ({ opened }) => {
  const restored = await restoreMark(opened);
  return reply(markJson(restored), { etag: etagOf(restored.edition) });
});
