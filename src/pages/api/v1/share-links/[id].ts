import { withdrawLink } from '../../../../server/captures/sharing/withdraw-link.ts';
import { nothing } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';

export const DELETE = route('shareLinks.delete', async ({ caller, opened, address }) => {
  await withdrawLink(caller, opened, address);
  return nothing;
});
