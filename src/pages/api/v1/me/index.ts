import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { meOf } from '../../../../server/session/me.ts';
import { patchMe } from '../../../../server/session/patch-me.ts';

export const GET = route('me.get', async ({ caller }) => reply(await meOf(personOf(caller))));

export const PATCH = route('me.patch', async ({ caller, body }) => {
  await patchMe(personOf(caller), body);
  return reply(await meOf(personOf(caller)));
});
