import { OPENERS, personOf } from '../../../../server/access.ts';
import { etagOf } from '../../../../server/http/etag.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { createSet } from '../../../../server/teaching/sets/create-set.ts';
import { listSets } from '../../../../server/teaching/sets/list-sets.ts';
import { setJson } from '../../../../server/teaching/sets/set-json.ts';
import { auditedBy, recordAudit } from '../../../../server/workshop/audit.ts';

export const GET = route('sets.list', async ({ caller, query }) =>
  reply(await listSets(personOf(caller), query)),
);

export const POST = route('sets.create', async ({ caller, body, address }) => {
  const person = personOf(caller);
  const id = await createSet(person, body);
  const made = await OPENERS.set(caller, 'sets.get', id);
  await recordAudit({
    ...auditedBy(caller, made.workshopId, address),
    action: 'set made',
    subject: made.title,
  });
  return reply(await setJson(made, person), { etag: etagOf(made.edition) });
});
