import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { browserOfRequest } from '../../../../server/session/browser.ts';
import { signUp } from '../../../../server/session/sign-up.ts';

export const POST = route('session.signUp', async ({ body, address, request }) => {
  const { cookie } = await signUp({ ...body, ...browserOfRequest(request, address) });
  if (cookie === null) return reply({ status: 'mail_sent' });
  return reply({ status: 'signed_in' }, { headers: { 'Set-Cookie': cookie.serialize() } });
});
