import { OPENERS, personOf } from '../../../../server/access.ts';
import { etagOf } from '../../../../server/http/etag.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { createExercise } from '../../../../server/teaching/exercises/create-exercise.ts';
import { exerciseJson } from '../../../../server/teaching/exercises/exercise-json.ts';
import { listExercises } from '../../../../server/teaching/exercises/list-exercises.ts';
import { auditedBy, recordAudit } from '../../../../server/workshop/audit.ts';

export const GET = route('exercises.list', async ({ caller, query }) =>
  reply(await listExercises(personOf(caller), query)),
);

export const POST = route('exercises.create', async ({ caller, body, address }) => {
  const person = personOf(caller);
  const id = await createExercise(person, body);
  const made = await OPENERS.exercise(caller, 'exercises.get', id);
  const by = auditedBy(caller, made.workshopId, address);
  await recordAudit({ ...by, action: `exercise made (${made.state})`, subject: made.title });
  return reply(await exerciseJson(made, person), { etag: etagOf(made.edition) });
});
