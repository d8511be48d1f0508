import { listAnswers } from '../../../../../server/captures/sharing/list-answers.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const GET = route('answers.list', async ({ opened }) =>
  reply({ items: await listAnswers(opened.id), nextCursor: null }),
);
