import { personOf } from '../../../../server/access.ts';
import { etagOf } from '../../../../server/http/etag.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { getWorkshop } from '../../../../server/workshop/get-workshop.ts';
import { patchWorkshop } from '../../../../server/workshop/patch-workshop.ts';

export const GET = route('workshop.get', async ({ caller }) => {
  const { edition, endsAt, ...workshop } = await getWorkshop(personOf(caller).workshopId);
  return reply({ ...workshop, endsAt: endsAt?.toISOString() ?? null }, { etag: etagOf(edition) });
});

export const PATCH = route('workshop.patch', async ({ caller, body, ifMatch, address }) => {
  const { id, name, timeZone, auditDays, edition } = await patchWorkshop(
    personOf(caller),
    body,
    ifMatch,
    address,
  );
  return reply({ id, name, timeZone, auditDays }, { etag: etagOf(edition) });
});
