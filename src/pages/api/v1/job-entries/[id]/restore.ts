import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { entryJson } from '../../../../../server/jobs/entries/entry-json.ts';
import { restoreEntry } from '../../../../../server/jobs/entries/restore-entry.ts';

export const POST = route('jobEntries.restore', async ({ opened }) => {
  const json = entryJson(await restoreEntry(opened));
  return reply(json, { etag: json.etag });
});
