import { personOf } from '../../../../../server/access.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { exerciseJson } from '../../../../../server/teaching/exercises/exercise-json.ts';
import { restoreExercise } from '../../../../../server/teaching/exercises/restore-exercise.ts';
import { auditedBy, recordAudit } from '../../../../../server/workshop/audit.ts';

export const POST = route('exercises.restore', async ({ caller, opened, address }) => {
  const back = await restoreExercise(opened);
  const by = auditedBy(caller, opened.workshopId, address);
  await recordAudit({ ...by, action: 'exercise brought back', subject: opened.title });
  return reply(await exerciseJson(back, personOf(caller)), { etag: etagOf(back.edition) });
});
