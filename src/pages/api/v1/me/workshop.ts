import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { me } from '../../../../server/session/me.ts';
import { switchWorkshop } from '../../../../server/session/switch-workshop.ts';

export const PUT = route('me.workshop', async ({ caller, body }) => {
  const person = personOf(caller);
  await switchWorkshop(person.personId, body.workshopId);
  return reply(await me(person.personId, 'session'));
});
