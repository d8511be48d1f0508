import { personOf } from '../../../../../server/access.ts';
import { captureJson } from '../../../../../server/captures/capture-json.ts';
import { deleteCapture } from '../../../../../server/captures/delete-capture.ts';
import { patchCapture } from '../../../../../server/captures/patch-capture.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { nothing, reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { auditedBy, recordAudit } from '../../../../../server/workshop/audit.ts';

export const GET = route('captures.get', async ({ opened }) =>
  reply(await captureJson(opened), { etag: etagOf(opened.edition) }),
);

export const PATCH = route('captures.patch', async ({ caller, opened, body, ifMatch }) => {
  const changed = await patchCapture(personOf(caller), opened, body, ifMatch);
  return reply(await captureJson(changed), { etag: etagOf(changed.edition) });
});

export const DELETE = route('captures.delete', async ({ caller, opened, address }) => {
  await deleteCapture(opened);
  const by = auditedBy(caller, opened.workshopId, address);
  await recordAudit({ ...by, action: 'capture deleted', subject: opened.title });
  return nothing;
});
