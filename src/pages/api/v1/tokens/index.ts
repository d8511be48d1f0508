import { personOf } from '../../../../server/access.ts';
import { reply } from '../../../../server/http/reply.ts';
import { route } from '../../../../server/http/route.ts';
import { createToken } from '../../../../server/session/create-token.ts';
import { listTokens } from '../../../../server/session/list-tokens.ts';

export const GET = route('tokens.list', async ({ caller }) =>
  reply({ items: await listTokens(personOf(caller)), nextCursor: null }),
);

export const POST = route('tokens.create', async ({ caller, body, address }) => {
  const made = await createToken(personOf(caller), body, address);
  return reply(made, { shownOnceFor: made.id });
});
