import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { ENDPOINTS } from '../../contract/endpoints.ts';
import { OPENERS } from '../../server/access.ts';
import { exportCsv } from '../../server/captures/export/export-csv.ts';
import { attachment } from '../attachment.ts';
import { call } from '../call.ts';
import { readQuery } from '../query.ts';
import type { FrontRequest } from '../types.ts';

/** GET /captures/{id}/export */
export async function exportEndpoint(front: FrontRequest): Promise<void> {
  const caller = await call(front, 'captures.export');
  const row = await OPENERS.capture(caller, 'captures.export', front.params.id ?? '');
  const { from, to } = readQuery(ENDPOINTS['captures.export'].query, front.url.searchParams);
  const lines = await exportCsv(row, { from, to });
  const first = await lines.next();
  front.response.writeHead(200, {
    'Content-Type': 'text/csv; charset=utf-8',
    'Content-Disposition': attachment(`${row.title || 'capture'}.csv`),
    'Cache-Control': 'private, no-store',
  });
  if (first.done) {
    front.response.end();
    return;
  }
  front.response.write(first.value);
  await pipeline(Readable.from(lines), front.response).catch(() => front.response.destroy());
}
