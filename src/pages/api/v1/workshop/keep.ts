import { personOf } from '../../../../server/access.ts';
import { nothing } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { keepWorkshop } from '../../../../server/workshop/end-workshop.ts';

export const POST = route('workshop.keep', async ({ caller, address }) => {
  await keepWorkshop(personOf(caller), address);
  return nothing;
});
