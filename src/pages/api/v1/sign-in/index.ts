import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { browserOfRequest } from '../../../../server/session/browser.ts';
import { me } from '../../../../server/session/me.ts';
import { signIn } from '../../../../server/session/sign-in.ts';

export const POST = route('session.signIn', async ({ body, address, request }) => {
  const { personId, step, cookie } = await signIn({ ...body, ...browserOfRequest(request, address) });
  const headers = { 'Set-Cookie': cookie.serialize() };
  if (step === 'code') return reply({ status: 'code_needed' as const }, { headers });
  return reply(await me(personId, 'session'), { headers });
});
