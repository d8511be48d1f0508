import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { listComparisons } from '../../../../server/library/list-comparisons.ts';

export const GET = route('comparisons.list', async ({ caller, query }) =>
  reply(await listComparisons(personOf(caller), query)),
);
