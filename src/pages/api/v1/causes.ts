import { reply } from '../../../server/http/reply.ts';
import { route } from '../../../server/http/route.ts';
import { listCauses } from '../../../server/jobs/path/list-data.ts';

export const GET = route('causes.list', () => reply({ items: listCauses(), nextCursor: null }));
