import { reply } from '../../../../../../server/http/reply.ts';
import { route } from '../../../../../../server/http/route.ts';
import { setResults } from '../../../../../../server/teaching/results/set-results.ts';

export const GET = route('sets.results', async ({ opened }) => reply(await setResults(opened)));
