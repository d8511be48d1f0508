import { cancelCapture } from '../../../../../server/captures/cancel-capture.ts';
import { captureJson } from '../../../../../server/captures/capture-json.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const POST = route('captures.cancel', async ({ opened }) => {
  const cancelled = await cancelCapture(opened);
  return reply(await captureJson(cancelled), { etag: etagOf(cancelled.edition) });
});
