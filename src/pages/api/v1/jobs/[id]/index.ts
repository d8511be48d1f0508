import { personOf } from '../../../../../server/access.ts';
import { nothing, reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { deleteJob } from '../../../../../server/jobs/delete-job.ts';
import { jobJson } from '../../../../../server/jobs/job-json.ts';
import { patchJob } from '../../../../../server/jobs/patch-job.ts';

export const GET = route('jobs.get', async ({ opened }) => {
  const json = await jobJson(opened);
  return reply(json, { etag: json.etag });
});

export const PATCH = route('jobs.patch', async ({ caller, opened, body, ifMatch, address }) => {
  const json = await jobJson(await patchJob(personOf(caller), opened, body, ifMatch, address));
  return reply(json, { etag: json.etag });
});

export const DELETE = route('jobs.delete', async ({ caller, opened, address }) => {
  await deleteJob(personOf(caller), opened, address);
  return nothing;
});
