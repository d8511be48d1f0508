import type { PhotoJson } from '../../../contract/areas/jobs.ts';
import type { PhotoRecord } from '../../access.ts';
import { etagOf } from '../../http/etag.ts';

export function photoJson(row: PhotoRecord): PhotoJson {
  return {
    id: row.id,
    jobId: row.jobId,
    caption: row.caption,
    check: row.check,
    width: row.width,
    height: row.height,
    bytes: row.bytes,
    contentType: row.contentType,
    by: row.author,
    at: row.createdAt.toISOString(),
    etag: etagOf(row.edition),
  };
}
