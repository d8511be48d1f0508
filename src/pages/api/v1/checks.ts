import { reply } from '../../../server/http/reply.ts';
import { route } from '../../../server/http/route.ts';
import { listChecks } from '../../../server/jobs/path/list-data.ts';

export const GET = route('checks.list', () => reply({ items: listChecks(), nextCursor: null }));
