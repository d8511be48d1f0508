import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { browserOfRequest } from '../../../../../server/session/browser.ts';
import { confirmEmail } from '../../../../../server/session/confirm-email.ts';

export const POST = route('session.confirmEmail', async ({ body, address, request }) => {
  const cookie = await confirmEmail(body.secret, browserOfRequest(request, address));
  return reply(null, cookie === null ? {} : { headers: { 'Set-Cookie': cookie.serialize() } });
});
