import { useEffect, useState } from 'react';
import { ApiFailure } from '../base/api.ts';
import { dropDraft, waitingDrafts } from './drafts.ts';
import { sendCheck } from './send-check.ts';

/** Sends what waits on this device as soon as the line is back; says how many wait. */
export function useWaiting(jobId: string, onSent: () => void): number {
  const [waiting, setWaiting] = useState(0);
  useEffect(() => {
    let gone = false;
    const send = async () => {
      for (const { check, draft } of waitingDrafts(jobId)) {
        try {
          await sendCheck(jobId, check, draft);
          dropDraft(jobId, check);
          if (!gone) onSent();
        } catch (thrown) {
          // Refused: it stays in the form, where the person reads why. Away: the next try comes.
          if (thrown instanceof ApiFailure && thrown.status === 0) break;
        }
      }
      if (!gone) setWaiting(waitingDrafts(jobId).length);
    };
    void send();
    const again = () => void send();
    window.addEventListener('online', again);
    const timer = setInterval(again, 20_000);
    return () => {
      gone = true;
      window.removeEventListener('online', again);
      clearInterval(timer);
    };
  }, [jobId, onSent]);
  return waiting;
}
