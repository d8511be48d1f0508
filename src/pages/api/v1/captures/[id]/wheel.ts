import { captureWheel } from '../../../../../server/captures/capture-wheel.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const GET = route('captures.wheel', async ({ opened }) => reply(await captureWheel(opened)));
