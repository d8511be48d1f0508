import { personOf } from '../../../../server/access.ts';
import { nothing } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { deleteToken } from '../../../../server/session/delete-token.ts';

export const DELETE = route('tokens.delete', async ({ caller, params, address }) => {
  await deleteToken(personOf(caller), params.id, address);
  return nothing;
});
