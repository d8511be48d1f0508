import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { createJob } from '../../../../server/jobs/create-job.ts';
import { jobJson } from '../../../../server/jobs/job-json.ts';
import { listJobs } from '../../../../server/jobs/list-jobs.ts';

export const GET = route('jobs.list', async ({ caller, query }) =>
  reply(await listJobs(personOf(caller), query)),
);

export const POST = route('jobs.create', async ({ caller, body, address }) => {
  const made = await jobJson(await createJob(personOf(caller), body, address));
  return reply(made, { etag: made.etag });
});
