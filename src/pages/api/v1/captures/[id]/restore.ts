import { captureJson } from '../../../../../server/captures/capture-json.ts';
import { restoreCapture } from '../../../../../server/captures/restore-capture.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { auditedBy, recordAudit } from '../../../../../server/workshop/audit.ts';

export const POST = route('captures.restore', async ({ caller, opened, address }) => {
  const restored = await restoreCapture(opened);
  const by = auditedBy(caller, opened.workshopId, address);
  await recordAudit({ ...by, action: 'capture brought back', subject: opened.title });
  return reply(await captureJson(restored), { etag: etagOf(restored.edition) });
});
