import { nothing, reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { deleteEntry } from '../../../../../server/jobs/entries/delete-entry.ts';
import { entryJson } from '../../../../../server/jobs/entries/entry-json.ts';
import { patchEntry } from '../../../../../server/jobs/entries/patch-entry.ts';

export const PATCH = route('jobEntries.patch', async ({ opened, body, ifMatch }) => {
  const json = entryJson(await patchEntry(opened, body, ifMatch));
  return reply(json, { etag: json.etag });
});

export const DELETE = route('jobEntries.delete', async ({ opened }) => {
  await deleteEntry(opened);
  return nothing;
});
