import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { endWorkshop } from '../../../../server/workshop/end-workshop.ts';

export const POST = route('workshop.end', async ({ caller, body, address }) => {
  const endsAt = await endWorkshop(personOf(caller), body, address);
  return reply({ endsAt: endsAt.toISOString() });
});
