import { useCallback, useEffect, useState } from 'react';
import type { MeasurementsJson } from '../../contract/areas/captures.ts';
import type { SharedCaptureJson } from '../../contract/areas/sharing.ts';
import { api } from '../base/api.ts';

export interface Shared {
  readonly shared: SharedCaptureJson | null;
  readonly measurements: MeasurementsJson | null;
  /** The numbers are there, or will not come. */
  readonly asked: boolean;
  readonly error: unknown;
  readonly reload: () => void;
}

/** What a link shows and its values. Plain fetches: this page loads as little as it can. */
export function useShared(secret: string): Shared {
  const [shared, setShared] = useState<SharedCaptureJson | null>(null);
  const [measurements, setMeasurements] = useState<MeasurementsJson | null>(null);
  const [asked, setAsked] = useState(false);
  const [error, setError] = useState<unknown>(null);
  const reload = useCallback(() => {
    api<SharedCaptureJson>(`/shared/${secret}`).then(({ data }) => {
      setShared(data);
      setError(null);
    }, setError);
  }, [secret]);
  useEffect(reload, [reload]);
  const status = shared?.capture.status;
  const ready = status === 'ready';
  useEffect(() => {
    if (status !== undefined && !ready) setAsked(true);
    if (!ready) return;
    // The trace is what counts here; without its numbers the page still serves.
    api<MeasurementsJson>(`/shared/${secret}/measurements`)
      .then(
        ({ data }) => setMeasurements(data),
        () => {},
      )
      .finally(() => setAsked(true));
  }, [secret, status, ready]);
  return { shared, measurements, asked, error, reload };
}
