import { useCallback, useEffect, useReducer, useRef } from 'react';
import { reduceUploads } from './reduce-uploads.ts';
import { type Sending, sendFile } from './send-file.ts';
import type { FileToSend, UploadItem } from './types.ts';

export interface Uploads {
  readonly items: readonly UploadItem[];
  add: (files: readonly FileToSend[]) => void;
  goOn: (key: string) => void;
  giveUp: (key: string) => void;
  remove: (key: string) => void;
}

/** Files on their way, one sent at a time: on a poor line two at once take longer than one after the other. */
export function useUploads(): Uploads {
  const [items, dispatch] = useReducer(reduceUploads, []);
  const made = useRef(0);
  const sendings = useRef(new Map<string, Promise<Sending>>());

  const start = useCallback((item: UploadItem) => {
    const { key } = item;
    dispatch({ type: 'start', key });
    const sending = sendFile(item, {
      onSent: (bytes) => dispatch({ type: 'sent', key, bytes }),
      onReceived: (captureId) => dispatch({ type: 'received', key, captureId }),
      onPaused: (happened) => dispatch({ type: 'paused', key, happened, since: new Date().toISOString() }),
      onRefused: (words) => dispatch({ type: 'refused', key, ...words }),
    });
    sending.catch(() =>
      dispatch({ type: 'paused', key, happened: 'No connection.', since: new Date().toISOString() }),
    );
    sendings.current.set(key, sending);
  }, []);

  useEffect(() => {
    const next = items.find((item) => item.phase === 'waiting');
    if (next !== undefined && navigator.onLine && !items.some((item) => item.phase === 'sending'))
      start(next);
  }, [items, start]);

  const latest = useRef(items);
  latest.current = items;

  useEffect(() => {
    const lost = () => {
      for (const item of latest.current.filter((each) => each.phase === 'sending')) {
        void sendings.current.get(item.key)?.then((sending) => sending.pause());
        dispatch({
          type: 'paused',
          key: item.key,
          happened: 'No connection.',
          since: new Date().toISOString(),
        });
      }
    };
    const back = () => {
      const [paused] = latest.current.filter((item) => item.phase === 'paused' || item.phase === 'waiting');
      if (paused !== undefined && !latest.current.some((item) => item.phase === 'sending')) start(paused);
    };
    addEventListener('offline', lost);
    addEventListener('online', back);
    return () => {
      removeEventListener('offline', lost);
      removeEventListener('online', back);
    };
  }, [start]);

  const busy = items.some((item) => item.phase === 'sending' || item.phase === 'waiting');
  useEffect(() => {
    if (!busy) return;
    const warn = (event: BeforeUnloadEvent) => event.preventDefault();
    addEventListener('beforeunload', warn);
    return () => removeEventListener('beforeunload', warn);
  }, [busy]);

  return {
    items,
    add: (files) =>
      dispatch({ type: 'add', files: files.map((file) => ({ ...file, key: String(made.current++) })) }),
    goOn: (key) => {
      const item = latest.current.find((each) => each.key === key);
      if (item !== undefined) start(item);
    },
    giveUp: (key) => {
      void sendings.current.get(key)?.then((sending) => sending.giveUp().catch(() => undefined));
      dispatch({ type: 'remove', key });
    },
    remove: (key) => dispatch({ type: 'remove', key }),
  };
}
