import type { JobEntryJson } from '../../../contract/areas/jobs.ts';
import type { JobEntryRecord } from '../../access.ts';
import { etagOf } from '../../http/etag.ts';

export function entryJson(row: JobEntryRecord): JobEntryJson {
  return {
    id: row.id,
    kind: row.kind,
    text: row.text,
    what: row.what,
    value: row.value,
    unit: row.unit,
    by: row.author,
    at: row.createdAt.toISOString(),
    etag: etagOf(row.edition),
  };
}
