import { personOf } from '../../../../server/access.ts';
import { nothing } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { endOwnSession } from '../../../../server/session/sessions.ts';

export const DELETE = route('sessions.delete', async ({ caller, params }) => {
  await endOwnSession(personOf(caller), params.id);
  return nothing;
});
