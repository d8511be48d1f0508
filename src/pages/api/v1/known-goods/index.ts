import { OPENERS, personOf } from '../../../../server/access.ts';
import { etagOf } from '../../../../server/http/etag.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { knownGoodJson } from '../../../../server/library/known-good-json.ts';
import { listKnownGoods } from '../../../../server/library/list-known-goods.ts';
import { proposeKnownGood } from '../../../../server/library/propose-known-good.ts';

export const GET = route('knownGoods.list', async ({ caller, query }) =>
  reply(await listKnownGoods(personOf(caller), query)),
);

export const POST = route('knownGoods.create', async ({ caller, body }) => {
  const id = await proposeKnownGood(personOf(caller), body);
  const made = await OPENERS.knownGood(caller, 'knownGoods.get', id);
  return reply(await knownGoodJson(made), { etag: etagOf(made.edition) });
});
