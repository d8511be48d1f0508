import { reply } from '../../../server/http/reply.ts';
import { route } from '../../../server/http/route.ts';
import { me } from '../../../server/session/me.ts';
import { signIn } from '../../../server/session/sign-in.ts';

export const POST = route('session.signIn', async ({ body, address, request }) => {
  const cookieHeader = request.headers.get('cookie') ?? undefined;
  const { personId, cookie } = await signIn({ ...body, address, cookieHeader });
  return reply(await me(personId, 'session'), { headers: { 'Set-Cookie': cookie.serialize() } });
});
