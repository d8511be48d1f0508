import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { findNearest } from '../../../../../server/library/find-nearest.ts';

export const POST = route('captures.nearest', async ({ opened, body }) =>
  reply(await findNearest(opened, body)),
);
