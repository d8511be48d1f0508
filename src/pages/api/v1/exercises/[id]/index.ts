import { personOf } from '../../../../../server/access.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { nothing, reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { deleteExercise } from '../../../../../server/teaching/exercises/delete-exercise.ts';
import { exerciseJson } from '../../../../../server/teaching/exercises/exercise-json.ts';
import { patchExercise } from '../../../../../server/teaching/exercises/patch-exercise.ts';
import { auditedBy, recordAudit } from '../../../../../server/workshop/audit.ts';

export const GET = route('exercises.get', async ({ caller, opened }) =>
  reply(await exerciseJson(opened, personOf(caller)), { etag: etagOf(opened.edition) }),
);

export const PATCH = route('exercises.patch', async ({ caller, opened, body, address }) => {
  const person = personOf(caller);
  const changed = await patchExercise(person, opened, body);
  const by = auditedBy(caller, opened.workshopId, address);
  if (changed.state !== opened.state)
    await recordAudit({ ...by, action: `exercise ${changed.state}`, subject: changed.title });
  if (changed.version !== opened.version)
    await recordAudit({
      ...by,
      action: `exercise changed to version ${changed.version}`,
      subject: changed.title,
    });
  return reply(await exerciseJson(changed, person), { etag: etagOf(changed.edition) });
});

export const DELETE = route('exercises.delete', async ({ caller, opened, address }) => {
  await deleteExercise(opened);
  const by = auditedBy(caller, opened.workshopId, address);
  await recordAudit({ ...by, action: 'exercise deleted', subject: opened.title });
  return nothing;
});
