import { shareOf } from '../../../../../server/access.ts';
import { getShared } from '../../../../../server/captures/sharing/get-shared.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const GET = route('shared.get', async ({ caller }) => reply(await getShared(shareOf(caller))));
