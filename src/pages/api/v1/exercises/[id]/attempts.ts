import { personOf } from '../../../../../server/access.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { commitAttempt } from '../../../../../server/teaching/attempts/commit-attempt.ts';
import { listAttempts } from '../../../../../server/teaching/attempts/list-attempts.ts';
import { exerciseJson } from '../../../../../server/teaching/exercises/exercise-json.ts';

export const GET = route('attempts.list', async ({ opened, query }) =>
  reply(await listAttempts(opened.id, query)),
);

export const POST = route('attempts.create', async ({ caller, opened, body }) => {
  const person = personOf(caller);
  await commitAttempt(person, opened, body);
  return reply(await exerciseJson(opened, person), { etag: etagOf(opened.edition) });
});
