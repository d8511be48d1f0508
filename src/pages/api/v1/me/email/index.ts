import { personOf } from '../../../../../server/access.ts';
import { nothing } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { askEmailChange } from '../../../../../server/session/ask-email-change.ts';

export const POST = route('me.email', async ({ caller, body, address }) => {
  await askEmailChange(personOf(caller), body, address);
  return nothing;
});
