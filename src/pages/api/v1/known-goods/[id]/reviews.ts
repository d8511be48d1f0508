import { personOf } from '../../../../../server/access.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { knownGoodJson } from '../../../../../server/library/known-good-json.ts';
import { reviewKnownGood } from '../../../../../server/library/review-known-good.ts';
import { auditedBy, recordAudit } from '../../../../../server/workshop/audit.ts';

export const POST = route('knownGoods.review', async ({ caller, opened, body, address }) => {
  const reviewed = await reviewKnownGood(personOf(caller), opened, body);
  const by = auditedBy(caller, opened.workshopId, address);
  await recordAudit({
    ...by,
    action: `known-good: ${body.decision}`,
    subject: `${opened.make} ${opened.model}`,
  });
  return reply(await knownGoodJson(reviewed), { etag: etagOf(reviewed.edition) });
});
