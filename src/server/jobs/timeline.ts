import { and, asc, eq, isNull } from 'drizzle-orm';
import type { TimelineItemJson } from '../../contract/areas/jobs.ts';
import type { JobRecord, PersonCaller } from '../access.ts';
import { listCaptures } from '../captures/list-captures.ts';
import { db } from '../db/client.ts';
import { jobEntry } from '../db/schema.ts';
import { entryJson } from './entries/entry-json.ts';
import { listPhotos } from './photos/list-photos.ts';
import { photoJson } from './photos/photo-json.ts';

/** Captures of a job that the timeline shows; a job has a handful. */
const MOST_CAPTURES = 100;

/** Everything that belongs to a job, oldest first. Bounded, since each part is. */
export async function timeline(caller: PersonCaller, row: JobRecord): Promise<TimelineItemJson[]> {
  const [entries, photos, captures] = await Promise.all([
    db()
      .select()
      .from(jobEntry)
      .where(and(eq(jobEntry.jobId, row.id), isNull(jobEntry.deletedAt)))
      .orderBy(asc(jobEntry.createdAt), asc(jobEntry.id)),
    listPhotos(row.id),
    capturesOf(caller, row),
  ]);
  const items: TimelineItemJson[] = [
    ...entries.map((entry) => {
      const json = entryJson(entry);
      return { type: 'entry' as const, at: json.at, entry: json };
    }),
    ...photos.map((found) => {
      const json = photoJson(found);
      return { type: 'photo' as const, at: json.at, photo: json };
    }),
    ...captures.map((capture) => ({ type: 'capture' as const, at: capture.createdAt, capture })),
  ];
  return items.sort((a, b) => (a.at < b.at ? -1 : a.at > b.at ? 1 : 0));
}

/** In the job's workshop, whichever is the current one; no practice capture belongs to a job. */
async function capturesOf(caller: PersonCaller, row: JobRecord) {
  const there: PersonCaller = { ...caller, workshopId: row.workshopId, role: 'technician' };
  return (await listCaptures(there, { limit: MOST_CAPTURES, jobId: row.id })).items;
}
