import type { MarkJson } from '../../../contract/areas/marks.ts';
import type { MarkRecord } from '../../access.ts';
import { etagOf } from '../../http/etag.ts';

export function markJson(row: MarkRecord): MarkJson {
  return {
    id: row.id,
    kind: row.kind,
    signal: row.signal,
    from: row.fromS,
    to: row.toS,
    value: row.value,
    text: row.text,
    author: row.author,
    fromAnswer: row.answerId !== null,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
    etag: etagOf(row.edition),
  };
}
