import { personOf } from '../../../../server/access.ts';
import { nothing } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { leaveWorkshop } from '../../../../server/workshop/leave-workshop.ts';

export const POST = route('me.leave', async ({ caller, address }) => {
  await leaveWorkshop(personOf(caller), address);
  return nothing;
});
