import { personOf } from '../../../../../server/access.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { restoreSet } from '../../../../../server/teaching/sets/restore-set.ts';
import { setJson } from '../../../../../server/teaching/sets/set-json.ts';
import { auditedBy, recordAudit } from '../../../../../server/workshop/audit.ts';

export const POST = route('sets.restore', async ({ caller, opened, address }) => {
  const back = await restoreSet(opened);
  const by = auditedBy(caller, opened.workshopId, address);
  await recordAudit({ ...by, action: 'set brought back', subject: opened.title });
  return reply(await setJson(back, personOf(caller)), { etag: etagOf(back.edition) });
});
