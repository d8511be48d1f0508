import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { confirmSignUp } from '../../../../server/session/confirm-sign-up.ts';
import { me } from '../../../../server/session/me.ts';

export const POST = route('session.confirmSignUp', async ({ body, address, request }) => {
  const cookieHeader = request.headers.get('cookie') ?? undefined;
  const { personId, cookie } = await confirmSignUp({ ...body, address, cookieHeader });
  return reply(await me(personId, 'session'), { headers: { 'Set-Cookie': cookie.serialize() } });
});
