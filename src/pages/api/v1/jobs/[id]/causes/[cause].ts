import { personOf } from '../../../../../../server/access.ts';
import { reply } from '../../../../../../server/http/reply.ts';
import { route } from '../../../../../../server/http/route.ts';
import { nextOfJob } from '../../../../../../server/jobs/path/next-of-job.ts';
import { putOverrule } from '../../../../../../server/jobs/path/put-overrule.ts';

export const PUT = route('jobCauses.put', async ({ caller, opened, params, body }) => {
  await putOverrule(opened.id, params.cause, personOf(caller), body);
  return reply(await nextOfJob(opened));
});
