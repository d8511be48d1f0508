import { captureMeasurements } from '../../../../../server/captures/capture-measurements.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const GET = route('captures.measurements', async ({ opened }) =>
  reply(await captureMeasurements(opened)),
);
