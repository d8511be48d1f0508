import { personOf } from '../../../../server/access.ts';
import { checkDescriptions } from '../../../../server/captures/import/check-descriptions.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';

export const POST = route('captures.checkImport', async ({ caller, body }) =>
  reply(await checkDescriptions(personOf(caller), body)),
);
