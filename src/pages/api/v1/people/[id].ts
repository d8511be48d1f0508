import { personOf } from '../../../../server/access.ts';
import { nothing, reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { changeRole } from '../../../../server/workshop/change-role.ts';
import { removePerson } from '../../../../server/workshop/remove-person.ts';

export const PATCH = route('people.patch', async ({ caller, params, body, address }) =>
  reply(await changeRole(personOf(caller), params.id, body.role, address)),
);

export const DELETE = route('people.remove', async ({ caller, params, address }) => {
  await removePerson(personOf(caller), params.id, address);
  return nothing;
});
