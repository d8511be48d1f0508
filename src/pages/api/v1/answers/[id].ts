import { hideAnswer } from '../../../../server/captures/sharing/hide-answer.ts';
import { nothing } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';

export const DELETE = route('answers.hide', async ({ caller, opened, address }) => {
  await hideAnswer(caller, opened, address);
  return nothing;
});
