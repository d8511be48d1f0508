import { useEffect, useState } from 'react';
import type { DecodedWindow } from '../plot/decode-window.ts';
import { WindowRefused, windowFetcher } from '../plot/fetch-window.ts';
import type { TurnRow } from './rows-of.ts';

/** So many windows are asked for at a time. */
const AT_ONCE = 4;
const RETRY_MS = 2000;

export interface RowWindows {
  /** By row, in order; null until it came. */
  readonly windows: readonly (DecodedWindow | null)[];
  readonly trouble: string | null;
}

/** One window a row. Asked for again after a fault of the network; what has come stays. */
export function useRowWindows(
  captureId: string,
  samplesVersion: number,
  rows: readonly TurnRow[],
  columns: number,
): RowWindows {
  const [state, setState] = useState<RowWindows>({ windows: [], trouble: null });
  useEffect(() => {
    if (columns < 1) return;
    const fetchWindow = windowFetcher(`/api/v1/captures/${captureId}/window`, samplesVersion);
    const abort = new AbortController();
    const windows: (DecodedWindow | null)[] = rows.map(() => null);
    setState({ windows, trouble: null });
    let next = 0;
    const work = async () => {
      while (next < rows.length) {
        const place = next;
        next += 1;
        for (;;) {
          try {
            windows[place] = await fetchWindow({ ...rows[place]!.stretch, columns }, abort.signal);
            if (abort.signal.aborted) return;
            setState({ windows: [...windows], trouble: null });
            break;
          } catch (thrown) {
            if (abort.signal.aborted) return;
            if (thrown instanceof WindowRefused) {
              setState({ windows: [...windows], trouble: thrown.message });
              return;
            }
            setState({
              windows: [...windows],
              trouble: 'The line is gone; what is there stays. Trying again.',
            });
            await new Promise((done) => setTimeout(done, RETRY_MS));
          }
        }
      }
    };
    void Promise.all(Array.from({ length: AT_ONCE }, work));
    return () => abort.abort();
  }, [captureId, samplesVersion, rows, columns]);
  return state;
}
