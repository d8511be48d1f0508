import useSWR from 'swr';
import type { CaptureJson, MeasurementsJson, WheelJson } from '../../contract/areas/captures.ts';
import type { MarkJson } from '../../contract/areas/marks.ts';
import { fetcher, fetcherWithEtag } from '../base/api.ts';

const POLL_MS = 1000;

export const isPending = (status: CaptureJson['status']) =>
  status === 'queued' || status === 'reading' || status === 'measuring';

/** The capture, asked again while it is being read or measured. */
export function useCapture(id: string) {
  return useSWR(`/captures/${id}`, fetcherWithEtag<CaptureJson>, {
    refreshInterval: (latest) => (latest !== undefined && isPending(latest.data.status) ? POLL_MS : 0),
    revalidateOnFocus: true,
    shouldRetryOnError: false,
  });
}

const once = { revalidateOnFocus: false, shouldRetryOnError: false };

/** Values, wheel and marks; asked only once they can be there. The revision in the key makes a new reading ask anew. */
export function useFindings(id: string, capture: CaptureJson | undefined) {
  const ready = capture?.status === 'ready';
  const key = (what: string) =>
    ready ? ([`/captures/${id}/${what}`, capture.revision, capture.samplesVersion] as const) : null;
  const measurements = useSWR(key('measurements'), ([path]) => fetcher<MeasurementsJson>(path), {
    ...once,
    refreshInterval: (latest) => (latest?.stale ? 5 * POLL_MS : 0),
  });
  const wheel = useSWR(key('wheel'), ([path]) => fetcher<WheelJson>(path), once);
  return { measurements, wheel };
}

export function useMarks(id: string, there: boolean) {
  return useSWR(there ? `/captures/${id}/marks` : null, fetcher<{ items: MarkJson[] }>, {
    shouldRetryOnError: false,
  });
}
