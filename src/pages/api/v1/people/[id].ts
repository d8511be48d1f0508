import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { changeRole } from '../../../../server/workshop/change-role.ts';

export const PATCH = route('people.patch', async ({ caller, params, body, address }) =>
  reply(await changeRole(personOf(caller), params.id, body.role, address)),
);
