import { personOf } from '../../../../server/access.ts';
import { nothing } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { eraseMe } from '../../../../server/session/erase-me.ts';

export const POST = route('me.erase', async ({ caller, body, address }) => {
  await eraseMe(personOf(caller), body, address);
  return nothing;
});
