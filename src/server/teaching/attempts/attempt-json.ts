import type { AttemptJson } from '../../../contract/areas/teaching.ts';
import type { attempt } from '../../db/schema.ts';
import { etagOf } from '../../http/etag.ts';

/** An attempt as the API gives it; `judge` is the name of who judged its text. */
export function attemptJson(row: typeof attempt.$inferSelect, judge: string | null): AttemptJson {
  return {
    id: row.id,
    version: row.version,
    answers: row.answers,
    sure: row.sure,
    why: row.why,
    marks: row.marks,
    outcome: row.outcome,
    comment: row.comment,
    judgedBy: row.judgedBy === null ? null : (judge ?? 'former member'),
    judgedAt: row.judgedAt?.toISOString() ?? null,
    createdAt: row.createdAt.toISOString(),
    etag: etagOf(row.edition),
  };
}
