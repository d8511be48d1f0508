import './library.css';
import { useState } from 'react';
import useSWR from 'swr';
import type { KnownGoodJson } from '../../contract/areas/library.ts';
import { fetcher, sentenceOf } from '../base/api.ts';
import { Message } from '../base/Message.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { stepsOf } from '../capture/steps-of.ts';
import { usePlotModel } from '../capture/usePlotModel.ts';
import { openingView } from '../capture/view-of.ts';
import { Plot } from '../plot/Plot.tsx';
import type { ScaleKind } from '../plot/ScaleBar.tsx';
import type { PlotCapture } from '../plot/types.ts';

/** What is frozen has one version for good. */
const FROZEN_VERSION = 1;
const NARROW = '(width < 40rem)';

const drawn = (known: KnownGoodJson): PlotCapture => ({
  startS: known.fromS,
  durationS: known.toS - known.fromS,
  samples: known.samples,
  samplesVersion: FROZEN_VERSION,
  axis: known.axis,
  signals: known.signals,
});

/** The frozen trace of a known-good in the product's one plot. */
export function KnownGoodTrace({ id }: { id: string }) {
  const { data, error } = useSWR(`/known-goods/${id}`, fetcher<KnownGoodJson>, {
    revalidateOnFocus: false,
    shouldRetryOnError: false,
  });
  const [scale, setScale] = useState<ScaleKind>('degrees');
  const wheel = data?.wheel ?? null;
  const model = usePlotModel({
    capture: data === undefined ? null : drawn(data),
    address: `/api/v1/known-goods/${id}/window`,
    version: FROZEN_VERSION,
    opening: () => openingView(stepsOf(wheel, undefined)[0] ?? null, matchMedia(NARROW).matches),
    onRefused: () => {},
  });
  if (error !== undefined)
    return (
      <Message
        verdict="bad"
        live="alert"
        title="The trace could not be loaded"
        happened={sentenceOf(error)}
      />
    );
  return (
    <div className="known-good-trace">
      {wheel !== null && (
        <div className="known-good-tools">
          <Segmented
            label="Scale"
            value={scale}
            onChange={(value) => setScale(value === 'seconds' ? 'seconds' : 'degrees')}
            options={[
              { value: 'degrees', text: 'Degrees' },
              { value: 'seconds', text: 'Seconds' },
            ]}
          />
        </div>
      )}
      <div className="known-good-plot">
        {model !== null && <Plot model={model} wheel={wheel} scale={wheel === null ? 'seconds' : scale} />}
      </div>
    </div>
  );
}
