import { shareOf } from '../../../../../server/access.ts';
import { countLook } from '../../../../../server/captures/sharing/count-look.ts';
import { nothing } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const POST = route('shared.seen', async ({ caller, address }) => {
  await countLook(shareOf(caller), address);
  return nothing;
});
