import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { nextOfJob } from '../../../../../server/jobs/path/next-of-job.ts';

export const GET = route('jobs.next', async ({ opened }) => reply(await nextOfJob(opened)));
