import { personOf } from '../../../../../../server/access.ts';
import { reply } from '../../../../../../server/http/reply.ts';
import { route } from '../../../../../../server/http/route.ts';
import { getJobCheck } from '../../../../../../server/jobs/path/get-job-check.ts';
import { putJobCheck } from '../../../../../../server/jobs/path/put-job-check.ts';

const withEtag = (json: Awaited<ReturnType<typeof getJobCheck>>) =>
  reply(json, { etag: json.record?.etag ?? '"0"' });

export const GET = route('jobChecks.get', async ({ opened, params }) =>
  withEtag(await getJobCheck(opened, params.check)),
);

export const PUT = route('jobChecks.put', async ({ caller, opened, params, body, ifMatch }) => {
  await putJobCheck({ job: opened, check: params.check, by: personOf(caller), input: body, ifMatch });
  return withEtag(await getJobCheck(opened, params.check));
});
