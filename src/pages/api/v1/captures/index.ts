import { personOf } from '../../../../server/access.ts';
import { listCaptures } from '../../../../server/captures/list-captures.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';

export const GET = route('captures.list', async ({ caller, query }) =>
  reply(await listCaptures(personOf(caller), query)),
);
