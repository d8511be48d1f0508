import type { JobCheckJson } from '../../contract/areas/path.ts';
import { api } from '../base/api.ts';
import type { Draft } from './drafts.ts';

/** Sends a check as it was typed. Numbers go as text: the server reads 12,6 and asks about 1,234. */
export async function sendCheck(jobId: string, check: string, draft: Draft): Promise<JobCheckJson> {
  const readings = Object.entries(draft.readings)
    .filter(([, { value }]) => value.trim() !== '')
    .map(([what, { value, unit }]) => ({ what, value, unit }));
  const { data } = await api<JobCheckJson>(`/jobs/${jobId}/checks/${check}`, {
    method: 'PUT',
    etag: draft.etag,
    body: {
      result: draft.result ?? 'unclear',
      finding: draft.finding,
      readings,
      codes: draft.codes
        .split(/[\n,;]+/)
        .map((code) => code.trim())
        .filter((code) => code !== ''),
      captureIds: draft.captureIds,
      note: draft.note,
      stands: draft.stands,
    },
  });
  return data;
}
