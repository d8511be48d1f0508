import { ENDPOINTS } from '../../contract/endpoints.ts';
import { OPENERS } from '../../server/access.ts';
import { nameOf } from '../../server/jobs/create-job.ts';
import { reportContent } from '../../server/jobs/report/report-content.ts';
import { REPORT_POLICY, reportHtml } from '../../server/jobs/report/report-html.ts';
import { reportPdf } from '../../server/jobs/report/report-pdf.ts';
import { call } from '../call.ts';
import { readQuery } from '../query.ts';
import type { FrontRequest } from '../types.ts';

/** GET /jobs/{id}/report: a page without scripts, or a PDF. */
export async function jobReportEndpoint(front: FrontRequest): Promise<void> {
  const caller = await call(front, 'jobs.report');
  const row = await OPENERS.job(caller, 'jobs.report', front.params.id ?? '');
  const query = readQuery(ENDPOINTS['jobs.report'].query, front.url.searchParams);
  const report = await reportContent(row, query.for);
  const pdf = query.format === 'pdf';
  const body = pdf ? await reportPdf(report) : Buffer.from(reportHtml(report));
  front.response.writeHead(200, {
    'Content-Type': pdf ? 'application/pdf' : 'text/html; charset=utf-8',
    'Content-Length': body.length,
    'Content-Disposition': pdf ? `inline; filename="${nameOf(row)}-${query.for}.pdf"` : 'inline',
    'Cache-Control': 'private, no-store',
    'Content-Security-Policy': pdf ? "default-src 'none'; style-src 'unsafe-inline'" : REPORT_POLICY,
  });
  front.response.end(body);
}
