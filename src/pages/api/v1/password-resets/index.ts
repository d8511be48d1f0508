import { nothing } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { askReset } from '../../../../server/session/ask-reset.ts';

export const POST = route('session.askReset', async ({ body, address }) => {
  await askReset(body.email, address);
  return nothing;
});
