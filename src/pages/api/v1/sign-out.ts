import { reply } from '../../../server/http/reply.ts';
import { route } from '../../../server/http/route.ts';
import { signOut } from '../../../server/session/sign-out.ts';

export const POST = route('session.signOut', async ({ request }) => {
  const cookie = await signOut(request.headers.get('cookie') ?? undefined);
  return reply(null, { headers: { 'Set-Cookie': cookie.serialize() } });
});
