import { personOf } from '../../../server/access.ts';
import { reply } from '../../../server/http/reply.ts';
import { route } from '../../../server/http/route.ts';
import { listAudit } from '../../../server/workshop/list-audit.ts';

export const GET = route('audit.list', async ({ caller, query }) =>
  reply(await listAudit(personOf(caller), query)),
);
