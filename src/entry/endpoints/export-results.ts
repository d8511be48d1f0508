import { OPENERS } from '../../server/access.ts';
import { exportResults } from '../../server/teaching/results/export-results.ts';
import { attachment } from '../attachment.ts';
import { call } from '../call.ts';
import type { FrontRequest } from '../types.ts';

/** GET /sets/{id}/results/export */
export async function exportResultsEndpoint(front: FrontRequest): Promise<void> {
  const caller = await call(front, 'sets.exportResults');
  const row = await OPENERS.set(caller, 'sets.exportResults', front.params.id ?? '');
  const body = Buffer.from(await exportResults(row));
  front.response.writeHead(200, {
    'Content-Type': 'text/csv; charset=utf-8',
    'Content-Length': body.length,
    'Content-Disposition': attachment(`${row.title || 'results'}.csv`),
    'Cache-Control': 'private, no-store',
  });
  front.response.end(front.request.method === 'HEAD' ? undefined : body);
}
