import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { browserOfRequest } from '../../../../server/session/browser.ts';
import { me } from '../../../../server/session/me.ts';
import { completeSignIn } from '../../../../server/session/second-step/complete-sign-in.ts';

export const POST = route('session.code', async ({ body, address, request }) => {
  const { personId, cookies } = await completeSignIn(body.code, browserOfRequest(request, address));
  return reply(await me(personId, 'session'), { headers: { 'Set-Cookie': cookies[0]?.serialize() ?? '' } });
});
