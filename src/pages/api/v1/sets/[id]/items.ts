import { personOf } from '../../../../../server/access.ts';
import { etagOf } from '../../../../../server/http/etag.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { addItem, putItems } from '../../../../../server/teaching/sets/put-items.ts';
import { setItems } from '../../../../../server/teaching/sets/set-items.ts';
import { setJson } from '../../../../../server/teaching/sets/set-json.ts';

export const GET = route('sets.items', async ({ caller, opened }) =>
  reply({ items: await setItems(opened, personOf(caller)), nextCursor: null }),
);

export const POST = route('sets.addItem', async ({ caller, opened, body }) => {
  const changed = await addItem(opened, body);
  return reply(await setJson(changed, personOf(caller)), { etag: etagOf(changed.edition) });
});

export const PUT = route('sets.putItems', async ({ caller, opened, body }) => {
  const changed = await putItems(opened, body.items);
  return reply(await setJson(changed, personOf(caller)), { etag: etagOf(changed.edition) });
});
