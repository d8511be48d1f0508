import { personOf } from '../../../../../server/access.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { addEntry } from '../../../../../server/jobs/entries/add-entry.ts';
import { entryJson } from '../../../../../server/jobs/entries/entry-json.ts';

export const POST = route('jobEntries.create', async ({ caller, opened, body }) => {
  const json = entryJson(await addEntry(personOf(caller), opened, body));
  return reply(json, { etag: json.etag });
});
