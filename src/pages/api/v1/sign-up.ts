import { reply } from '../../../server/http/reply.ts';
import { route } from '../../../server/http/route.ts';
import { me } from '../../../server/session/me.ts';
import { signUp } from '../../../server/session/sign-up.ts';

export const POST = route('session.signUp', async ({ body, address, request }) => {
  const cookieHeader = request.headers.get('cookie') ?? undefined;
  const { personId, cookie } = await signUp({ ...body, address, cookieHeader });
  return reply(await me(personId, 'session'), { headers: { 'Set-Cookie': cookie.serialize() } });
});
