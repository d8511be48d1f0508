import { nothing } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { withdrawInvitation } from '../../../../server/workshop/invitations/withdraw-invitation.ts';

export const DELETE = route('invitations.delete', async ({ caller, opened, address }) => {
  await withdrawInvitation(caller, opened, address);
  return nothing;
});
