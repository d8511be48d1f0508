import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { createWebhook } from '../../../../server/workshop/webhooks/create-webhook.ts';
import { listWebhooks } from '../../../../server/workshop/webhooks/list-webhooks.ts';

export const GET = route('webhooks.list', async ({ caller }) =>
  reply({ items: await listWebhooks(personOf(caller)), nextCursor: null }),
);

export const POST = route('webhooks.create', async ({ caller, body, address }) => {
  const made = await createWebhook(personOf(caller), body.url, address);
  return reply(made, { shownOnceFor: made.id });
});
