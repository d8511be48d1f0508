import { capturePreview } from '../../../../../server/captures/capture-preview.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const GET = route('captures.preview', ({ opened }) => reply(capturePreview(opened)));
