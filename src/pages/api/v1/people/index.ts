import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { listPeople } from '../../../../server/workshop/list-people.ts';

export const GET = route('people.list', async ({ caller, query }) =>
  reply(await listPeople(personOf(caller), query)),
);
