import { shareOf } from '../../../../../server/access.ts';
import { addAnswer } from '../../../../../server/captures/sharing/add-answer.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const POST = route('shared.answer', async ({ caller, body, address }) =>
  reply(await addAnswer(shareOf(caller), body, address)),
);
