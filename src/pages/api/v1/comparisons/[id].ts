import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { comparisonJson } from '../../../../server/library/comparison-json.ts';

export const GET = route('comparisons.get', ({ opened }) => reply(comparisonJson(opened)));
