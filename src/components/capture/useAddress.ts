import { useEffect } from 'react';
import type { LaneSetup } from '../plot/lane-setup.ts';
import type { PlotModel } from '../plot/model.ts';
import { addressOf } from './address.ts';

const RESTED_MS = 500;

/** Keeps the address in step with what is shown once it rests, so that a copied link opens the same. */
export function useAddress(model: PlotModel | null, setup: LaneSetup): void {
  useEffect(() => {
    if (model === null) return;
    let timer: ReturnType<typeof setTimeout> | undefined;
    const write = () => {
      const signals = model.capture.signals.map(({ index }) => index);
      const shown = { view: model.view.get(), span: model.span.get(), cursorS: model.cursorS.get(), setup };
      const query = addressOf(location.search, shown, signals);
      if (`?${query}` !== location.search) history.replaceState(history.state, '', `?${query}`);
    };
    const later = () => {
      clearTimeout(timer);
      timer = setTimeout(write, RESTED_MS);
    };
    const stops = [model.view, model.span, model.cursorS].map((store) => store.subscribe(later));
    later();
    return () => {
      for (const stop of stops) stop();
      clearTimeout(timer);
    };
  }, [model, setup]);
}
