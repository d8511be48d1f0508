import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { listDeliveries } from '../../../../../server/workshop/webhooks/list-deliveries.ts';

export const GET = route('webhooks.deliveries', async ({ opened, query }) =>
  reply(await listDeliveries(opened.id, query)),
);
