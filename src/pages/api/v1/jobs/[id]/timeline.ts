import { personOf } from '../../../../../server/access.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { timeline } from '../../../../../server/jobs/timeline.ts';

export const GET = route('jobs.timeline', async ({ caller, opened }) =>
  reply({ items: await timeline(personOf(caller), opened), nextCursor: null }),
);
