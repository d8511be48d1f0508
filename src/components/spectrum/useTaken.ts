import { useEffect, useState } from 'react';
import type { PlotModel } from '../plot/model.ts';
import type { PlotSignal } from '../plot/types.ts';
import { readSamples, type Taken } from './read-samples.ts';

const RESTED_MS = 300;

/** The samples of the shown window once it rests; the last ones stay until others have come. */
export function useTaken(
  model: PlotModel,
  signal: PlotSignal,
): { readonly taken: Taken | null; readonly trouble: string | null } {
  const [taken, setTaken] = useState<Taken | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  useEffect(() => {
    let abort = new AbortController();
    let timer: ReturnType<typeof setTimeout> | undefined;
    const read = () => {
      abort.abort();
      abort = new AbortController();
      const { signal: given } = abort;
      readSamples(model.capture, signal, model.view.get(), model.fetchWindow, given).then(
        (next) => {
          if (given.aborted) return;
          setTaken(next);
          setTrouble(null);
        },
        () => {
          if (given.aborted) return;
          setTrouble('The samples could not be had. Trying again.');
          timer = setTimeout(read, 2000);
        },
      );
    };
    const later = () => {
      clearTimeout(timer);
      timer = setTimeout(read, RESTED_MS);
    };
    read();
    const stop = model.view.subscribe(later);
    return () => {
      stop();
      clearTimeout(timer);
      abort.abort();
    };
  }, [model, signal]);
  return { taken, trouble };
}
