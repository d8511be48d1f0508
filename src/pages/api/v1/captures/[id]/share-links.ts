import { personOf } from '../../../../../server/access.ts';
import { createLink } from '../../../../../server/captures/sharing/create-link.ts';
import { listLinks } from '../../../../../server/captures/sharing/list-links.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';

export const GET = route('shareLinks.list', async ({ opened }) =>
  reply({ items: await listLinks(opened.id), nextCursor: null }),
);

export const POST = route('shareLinks.create', async ({ caller, opened, body, address }) => {
  const made = await createLink(personOf(caller), opened, body, address);
  return reply(made, { shownOnceFor: made.id });
});
