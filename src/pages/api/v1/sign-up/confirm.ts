import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { browserOfRequest } from '../../../../server/session/browser.ts';
import { confirmSignUp } from '../../../../server/session/confirm-sign-up.ts';
import { me } from '../../../../server/session/me.ts';

export const POST = route('session.confirmSignUp', async ({ body, address, request }) => {
  const { personId, cookie } = await confirmSignUp({ ...body, ...browserOfRequest(request, address) });
  return reply(await me(personId, 'session'), { headers: { 'Set-Cookie': cookie.serialize() } });
});
