import type { ComparisonJson } from '../../contract/areas/library.ts';
import type { ComparisonRecord } from '../access.ts';
import { storedRequest } from './comparison-request.ts';

/** A comparison as the API shows it; the parts that are not there yet are null or empty. */
export function comparisonJson(row: ComparisonRecord): ComparisonJson {
  return {
    engine: null,
    signal: storedRequest.parse(row.request).signal,
    here: null,
    other: null,
    alignment: null,
    rows: [],
    shape: null,
    overlay: null,
    camShift: null,
    says: null,
    text: '',
    ...(row.result ?? {}),
    adjustment: row.adjustment,
    id: row.id,
    captureId: row.captureId,
    status: row.status,
    error: row.error,
    createdAt: row.createdAt.toISOString(),
  };
}
