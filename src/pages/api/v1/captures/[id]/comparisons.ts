import { personOf } from '../../../../../server/access.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { createComparison } from '../../../../../server/library/create-comparison.ts';

export const POST = route('comparisons.create', async ({ caller, opened, body }) =>
  reply(await createComparison(personOf(caller), opened, body)),
);
