import { OPENERS, shareOf } from '../../../../../server/access.ts';
import { captureMeasurements } from '../../../../../server/captures/capture-measurements.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const GET = route('shared.measurements', async ({ caller }) => {
  const row = await OPENERS.capture(caller, 'shared.measurements', shareOf(caller).captureId);
  return reply(await captureMeasurements(row));
});
