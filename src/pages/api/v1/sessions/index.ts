import { personOf } from '../../../../server/access.ts';
import { nothing, reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { endOtherSessions, listSessions } from '../../../../server/session/sessions.ts';

export const GET = route('sessions.list', async ({ caller }) =>
  reply({ items: await listSessions(personOf(caller)), nextCursor: null }),
);

export const DELETE = route('sessions.deleteOthers', async ({ caller }) => {
  await endOtherSessions(personOf(caller));
  return nothing;
});
