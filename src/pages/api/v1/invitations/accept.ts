import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { browserOfRequest } from '../../../../server/session/browser.ts';
import { me } from '../../../../server/session/me.ts';
import { acceptInvitation } from '../../../../server/workshop/invitations/accept-invitation.ts';

export const POST = route('invitations.accept', async ({ body, address, request }) => {
  const { personId, cookie } = await acceptInvitation(body, browserOfRequest(request, address));
  return reply(
    await me(personId, 'session'),
    cookie === null ? {} : { headers: { 'Set-Cookie': cookie.serialize() } },
  );
});
