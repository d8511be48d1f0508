import { etagOf } from '../../../../../server/http/etag.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { knownGoodJson } from '../../../../../server/library/known-good-json.ts';
import { patchKnownGood } from '../../../../../server/library/patch-known-good.ts';

export const GET = route('knownGoods.get', async ({ opened }) =>
  reply(await knownGoodJson(opened), { etag: etagOf(opened.edition) }),
);

export const PATCH = route('knownGoods.patch', async ({ opened, body }) => {
  const changed = await patchKnownGood(opened, body);
  return reply(await knownGoodJson(changed), { etag: etagOf(changed.edition) });
});
