import { etagOf } from '../../../../server/http/etag.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { adjustComparison } from '../../../../server/library/adjust-comparison.ts';
import { comparisonJson } from '../../../../server/library/comparison-json.ts';

export const GET = route('comparisons.get', ({ opened }) =>
  reply(comparisonJson(opened), { etag: etagOf(opened.edition) }),
);

export const PATCH = route('comparisons.patch', async ({ opened, body }) => {
  const changed = await adjustComparison(opened, body);
  return reply(comparisonJson(changed), { etag: etagOf(changed.edition) });
});
