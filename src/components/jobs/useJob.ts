import useSWR from 'swr';
import type { JobJson, TimelineItemJson } from '../../contract/areas/jobs.ts';
import { fetcher } from '../base/api.ts';
import { isUnderWay } from '../captures/words.ts';

export interface JobData {
  readonly job: JobJson;
  readonly items: readonly TimelineItemJson[];
  /** The job as the server just gave it back. */
  put: (job: JobJson) => void;
  /** Asks for everything again. */
  reload: () => Promise<unknown>;
}

const WATCH_MS = 2_500;

const isMeasured = (item: TimelineItemJson) => item.type === 'capture' && isUnderWay(item.capture.status);

/** A job and its timeline, beginning with what came with the document; asked for again while a capture is measured. */
export function useJob(first: JobJson, firstItems: readonly TimelineItemJson[]): JobData {
  const job = useSWR<JobJson, Error>(`/jobs/${first.id}`, fetcher, {
    fallbackData: first,
    revalidateOnMount: false,
  });
  const timeline = useSWR<{ items: readonly TimelineItemJson[] }, Error>(
    `/jobs/${first.id}/timeline`,
    fetcher,
    {
      fallbackData: { items: firstItems },
      revalidateOnMount: firstItems.some(isMeasured),
      refreshInterval: (data) => ((data?.items ?? firstItems).some(isMeasured) ? WATCH_MS : 0),
    },
  );
  const put = (changed: JobJson) => {
    void job.mutate(changed, { revalidate: false });
    void timeline.mutate();
  };
  return {
    job: job.data ?? first,
    items: timeline.data?.items ?? firstItems,
    put,
    reload: () => Promise.all([job.mutate(), timeline.mutate()]),
  };
}
