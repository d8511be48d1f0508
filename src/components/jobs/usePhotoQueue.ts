import { useCallback, useEffect, useRef, useState } from 'react';
import type { PhotoJson } from '../../contract/areas/jobs.ts';
import { ApiFailure, failureOf, sentenceOf } from '../base/api.ts';

export interface QueuedPhoto {
  readonly key: string;
  readonly file: File;
  readonly phase: 'waiting' | 'sending' | 'paused' | 'refused';
  readonly happened: string | null;
}

export interface PhotoQueue {
  readonly items: readonly QueuedPhoto[];
  add: (files: readonly File[]) => void;
  again: (key: string) => void;
  remove: (key: string) => void;
}

const newKey = () =>
  Array.from(crypto.getRandomValues(new Uint8Array(12)), (byte) => byte.toString(36)).join('');

/** Sends one photo. Sent twice with one key it is kept once. */
async function sendPhoto(
  jobId: string,
  { file, key }: Pick<QueuedPhoto, 'file' | 'key'>,
): Promise<PhotoJson> {
  const body = new FormData();
  body.set('file', file, file.name || 'photo');
  const response = await fetch(`/api/v1/jobs/${jobId}/photos`, {
    method: 'POST',
    credentials: 'same-origin',
    headers: { accept: 'application/json', 'idempotency-key': key },
    body,
  }).catch(() => {
    throw new ApiFailure(0, 'no_connection', 'No connection.');
  });
  if (!response.ok) throw await failureOf(response);
  return (await response.json()) as PhotoJson;
}

/** Photos on their way to a job, one at a time; they wait while the line is away and go on when it is back. */
export function usePhotoQueue(jobId: string, onSent: () => void): PhotoQueue {
  const [items, setItems] = useState<readonly QueuedPhoto[]>([]);
  const latest = useRef(items);
  latest.current = items;
  const sent = useRef(onSent);
  sent.current = onSent;
  const set = useCallback(
    (key: string, change: Partial<QueuedPhoto>) =>
      setItems((all) => all.map((item) => (item.key === key ? { ...item, ...change } : item))),
    [],
  );
  useEffect(() => {
    const next = items.find((item) => item.phase === 'waiting');
    if (next === undefined || items.some((item) => item.phase === 'sending')) return;
    set(next.key, { phase: 'sending', happened: null });
    sendPhoto(jobId, next).then(
      () => {
        setItems((all) => all.filter((item) => item.key !== next.key));
        sent.current();
      },
      (thrown: unknown) => {
        const status = thrown instanceof ApiFailure ? thrown.status : 0;
        const passing = status === 0 || status === 409 || status === 429 || status >= 500;
        set(next.key, { phase: passing ? 'paused' : 'refused', happened: sentenceOf(thrown) });
      },
    );
  }, [items, jobId, set]);
  useEffect(() => {
    const back = () => {
      for (const item of latest.current) if (item.phase === 'paused') set(item.key, { phase: 'waiting' });
    };
    addEventListener('online', back);
    return () => removeEventListener('online', back);
  }, [set]);
  const busy = items.some((item) => item.phase !== 'refused');
  useEffect(() => {
    if (!busy) return;
    const warn = (event: BeforeUnloadEvent) => event.preventDefault();
    addEventListener('beforeunload', warn);
    return () => removeEventListener('beforeunload', warn);
  }, [busy]);
  return {
    items,
    add: (files) =>
      setItems((all) => [
        ...all,
        ...files.map((file) => ({ key: newKey(), file, phase: 'waiting' as const, happened: null })),
      ]),
    again: (key) => set(key, { phase: 'waiting' }),
    remove: (key) => setItems((all) => all.filter((item) => item.key !== key)),
  };
}
