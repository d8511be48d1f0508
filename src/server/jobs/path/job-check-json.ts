import type { CheckRecordJson, JobCheckJson } from '../../../contract/areas/path.ts';
import { etagOf } from '../../http/etag.ts';
import { CHECKS, type CheckId } from './data/checks.ts';
import type { MeasuredReading } from './facts.ts';
import type { JobCheckRow } from './path-of-job.ts';

export const recordJson = (row: JobCheckRow): CheckRecordJson => ({
  check: row.check,
  result: row.result,
  finding: row.finding,
  readings: row.readings,
  codes: row.codes,
  captureIds: row.captureIds,
  note: row.note,
  stands: row.stands,
  author: row.author,
  at: row.updatedAt.toISOString(),
  etag: etagOf(row.edition),
});

export const measuredJson = (
  check: CheckId,
  measured: readonly MeasuredReading[],
): JobCheckJson['measured'] =>
  measured
    .filter((one) => one.check === check)
    .map(({ check: of, ...rest }) => ({
      ...rest,
      what: CHECKS[of].readings[rest.reading]?.what ?? rest.reading,
    }));
