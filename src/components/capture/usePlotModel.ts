import { useEffect, useState } from 'react';
import { windowFetcher } from '../plot/fetch-window.ts';
import { createPlotModel, type PlotModel } from '../plot/model.ts';
import type { PlotCapture, View } from '../plot/types.ts';

interface PlotModelOptions {
  /** Null until capture and wheel are known. */
  readonly capture: PlotCapture | null;
  readonly address: string;
  /** Answers under this version never change; null: always ask the server. */
  readonly version: number | null;
  readonly opening: () => View | null;
  /** The server says that asking again does not help: samples were read again, or the thing is gone. */
  readonly onRefused: () => void;
}

/** One plot model as long as the samples stay the same. */
export function usePlotModel({
  capture,
  address,
  version,
  opening,
  onRefused,
}: PlotModelOptions): PlotModel | null {
  const [model, setModel] = useState<PlotModel | null>(null);
  const key =
    capture === null
      ? null
      : `${address} ${capture.samplesVersion} ${capture.signals.map((s) => `${s.index} ${s.circuit} ${s.factor} ${s.offset} ${s.name} ${s.unit}`).join()}`;
  // biome-ignore lint/correctness/useExhaustiveDependencies: a model lives as long as its samples, whatever else changes
  useEffect(() => {
    if (capture === null) return;
    const made = createPlotModel(capture, windowFetcher(address, version), opening());
    const stop = made.loader.state.subscribe(() => {
      if (made.loader.state.get().refused) onRefused();
    });
    setModel(made);
    return () => {
      stop();
      made.close();
      setModel(null);
    };
  }, [key]);
  return model;
}
