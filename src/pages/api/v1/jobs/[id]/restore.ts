import { personOf } from '../../../../../server/access.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { jobJson } from '../../../../../server/jobs/job-json.ts';
import { restoreJob } from '../../../../../server/jobs/restore-job.ts';

export const POST = route('jobs.restore', async ({ caller, opened, address }) => {
  const json = await jobJson(await restoreJob(personOf(caller), opened, address));
  return reply(json, { etag: json.etag });
});
