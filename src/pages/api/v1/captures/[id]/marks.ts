import { personOf } from '../../../../../server/access.ts';
import { createMark } from '../../../../../server/captures/marks/create-mark.ts';
import { listMarks } from '../../../../../server/captures/marks/list-marks.ts';
import { markJson } from '../../../../../server/captures/marks/mark-json.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const GET = route('marks.list', async ({ opened }) =>
  reply({ items: (await listMarks(opened.id)).map(markJson), nextCursor: null }),
);

export const POST = route('marks.create', async ({ caller, opened, body }) => {
  const { personId, name } = personOf(caller);
  const made = await createMark(opened.id, { personId, name }, body);
  return reply(markJson(made), { etag: etagOf(made.edition) });
});
