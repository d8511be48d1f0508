import { personOf } from '../../../../../server/access.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { nothing, reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { deleteSet } from '../../../../../server/teaching/sets/delete-set.ts';
import { patchSet } from '../../../../../server/teaching/sets/patch-set.ts';
import { setJson } from '../../../../../server/teaching/sets/set-json.ts';
import { auditedBy, recordAudit } from '../../../../../server/workshop/audit.ts';

export const GET = route('sets.get', async ({ caller, opened }) =>
  reply(await setJson(opened, personOf(caller)), { etag: etagOf(opened.edition) }),
);

export const PATCH = route('sets.patch', async ({ caller, opened, body, address }) => {
  const changed = await patchSet(opened, body);
  // Whom a set is for decides who sees what: that is worth a line.
  if (body.state !== undefined || body.audience !== undefined || body.people !== undefined) {
    const action = `set for ${changed.state === 'open' ? changed.audience : 'nobody (draft)'}`;
    await recordAudit({ ...auditedBy(caller, opened.workshopId, address), action, subject: changed.title });
  }
  return reply(await setJson(changed, personOf(caller)), { etag: etagOf(changed.edition) });
});

export const DELETE = route('sets.delete', async ({ caller, opened, address }) => {
  await deleteSet(opened);
  const by = auditedBy(caller, opened.workshopId, address);
  await recordAudit({ ...by, action: 'set deleted', subject: opened.title });
  return nothing;
});
