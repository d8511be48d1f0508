import { nothing } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { deleteWebhook } from '../../../../../server/workshop/webhooks/delete-webhook.ts';

export const DELETE = route('webhooks.delete', async ({ caller, opened, address }) => {
  await deleteWebhook(caller, opened, address);
  return nothing;
});
