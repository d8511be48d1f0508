import useSWR from 'swr';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import { type ApiAnswer, fetcherWithEtag } from '../base/api.ts';
import { isUnderWay } from '../captures/words.ts';

const POLL_MS = 700;

/** A capture with its ETag, asked for again while it is read or measured. */
export function useCapture(id: string) {
  return useSWR<ApiAnswer<CaptureJson>>(`/captures/${id}`, fetcherWithEtag, {
    refreshInterval: (latest) => (latest === undefined || isUnderWay(latest.data.status) ? POLL_MS : 0),
    refreshWhenHidden: false,
    dedupingInterval: 200,
  });
}
