import { openApi } from '../../../contract/openapi.ts';
import { reply } from '../../../server/http/reply.ts';
import { route } from '../../../server/http/route.ts';

export const GET = route('openapi', () => reply(openApi()));
