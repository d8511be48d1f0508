import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { createInvitation } from '../../../../server/workshop/invitations/create-invitation.ts';
import { listInvitations } from '../../../../server/workshop/invitations/list-invitations.ts';

export const GET = route('invitations.list', async ({ caller, query }) =>
  reply(await listInvitations(personOf(caller), query)),
);

export const POST = route('invitations.create', async ({ caller, body, address }) => {
  const made = await createInvitation(personOf(caller), body, address);
  return reply(made, made.url === null ? {} : { shownOnceFor: made.id });
});
