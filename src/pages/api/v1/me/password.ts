import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { browserOfRequest } from '../../../../server/session/browser.ts';
import { changePassword } from '../../../../server/session/change-password.ts';

export const PUT = route('me.password', async ({ caller, body, address, request }) => {
  const cookie = await changePassword(personOf(caller), body, browserOfRequest(request, address));
  return reply(null, { headers: { 'Set-Cookie': cookie.serialize() } });
});
