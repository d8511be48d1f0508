import { personOf } from '../../../../server/access.ts';
import { etagOf } from '../../../../server/http/etag.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { judgeAttempt } from '../../../../server/teaching/attempts/judge-attempt.ts';
import { attemptOfJson } from '../../../../server/teaching/attempts/list-attempts.ts';
import { auditedBy, recordAudit } from '../../../../server/workshop/audit.ts';

export const PATCH = route('attempts.judge', async ({ caller, opened, body, address }) => {
  const edition = await judgeAttempt(personOf(caller), opened, body);
  const judged = await attemptOfJson(opened.id);
  const by = auditedBy(caller, opened.workshopId, address);
  await recordAudit({ ...by, action: `answer judged: ${body.mark}`, subject: judged.person.name });
  return reply(judged, { etag: etagOf(edition) });
});
