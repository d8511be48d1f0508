import { reply } from '../../../server/http/reply.ts';
import { route } from '../../../server/http/route.ts';
import { checkHealth } from '../../../server/workshop/check-health.ts';

export const GET = route('health', async () => reply(await checkHealth()));
