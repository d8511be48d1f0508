import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { meOf } from '../../../../server/session/me.ts';

export const GET = route('me.get', async ({ caller }) => reply(await meOf(personOf(caller))));
