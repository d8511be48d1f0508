import '../capture/capture.css';
import '../plot/plot.css';
import './spectrum.css';
import { useEffect, useMemo, useState } from 'react';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import type { WindowFunction } from '../../engine/signal/window-function.ts';
import { circuitWords } from '../base/circuits.ts';
import { Message } from '../base/Message.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { shownInAddress } from '../capture/address.ts';
import { CaptureActions } from '../capture/CaptureActions.tsx';
import { CaptureHead } from '../capture/CaptureHead.tsx';
import { CaptureGone, CaptureSkeleton, CaptureState } from '../capture/CaptureState.tsx';
import { useCapture, useFindings } from '../capture/use-capture.ts';
import { useAddress } from '../capture/useAddress.ts';
import { usePlotModel } from '../capture/usePlotModel.ts';
import { PLAIN_SETUP } from '../plot/lane-setup.ts';
import type { PlotModel } from '../plot/model.ts';
import { Strip } from '../plot/Strip.tsx';
import { useSize } from '../plot/useSize.ts';
import { createViewModel } from '../plot/view-model.ts';
import { crankSpeed } from './crank-speed.ts';
import { SpectrumPanel } from './SpectrumPanel.tsx';
import { type Height, SpectrumPlot } from './SpectrumPlot.tsx';
import { openingHz, spectrumOf } from './spectrum-of.ts';
import { useTaken } from './useTaken.ts';

const WINDOWS: readonly (readonly [WindowFunction, string])[] = [
  ['hann', 'Hann'],
  ['flattop', 'Flat top'],
  ['blackman', 'Blackman'],
  ['none', 'None'],
];

/** The capture's fourth tab: frequencies of the shown window. */
export function CaptureSpectrum({ id }: { id: string }) {
  const loaded = useCapture(id);
  const capture = loaded.data?.data;
  const there = capture !== undefined && capture.samples > 0 && capture.axis === 'even';
  const model = usePlotModel({
    capture: there ? capture : null,
    address: `/api/v1/captures/${id}/window`,
    version: capture?.samplesVersion ?? null,
    opening: () => shownInAddress(location.search, []).view,
    onRefused: () => void loaded.mutate(),
  });
  if (capture === undefined)
    return loaded.error === undefined ? <CaptureSkeleton /> : <CaptureGone error={loaded.error} />;
  if (model !== null) return <Frequencies capture={capture} model={model} />;
  return (
    <div className="capture-flow">
      <CaptureHead capture={capture} tab="spectrum" actions={<CaptureActions capture={capture} />} />
      {capture.samples === 0 && <CaptureState capture={capture} onChange={() => void loaded.mutate()} />}
      {capture.samples > 0 && !there && (
        <div className="capture-state">
          <Message
            verdict="info"
            title="Samples at uneven steps have no spectrum here"
            happened="Frequencies are told from samples that come at one step; these do not."
            todo="Record with a fixed sample rate, or measure a period with Span in the trace."
            actions={
              <a className="button" href={`/captures/${capture.id}`}>
                To the trace
              </a>
            }
          />
        </div>
      )}
      {there && <CaptureSkeleton />}
    </div>
  );
}

function Frequencies({ capture, model }: { capture: CaptureJson; model: PlotModel }) {
  const { measurements, wheel } = useFindings(capture.id, capture);
  const [index, setIndex] = useState(capture.signals[0]?.index ?? 0);
  const [height, setHeight] = useState<Height>('linear');
  const [windowName, setWindow] = useState<WindowFunction>('hann');
  const [chosen, setChosen] = useState<number | null>(null);
  const [strip, stripSize] = useSize<HTMLDivElement>();
  useEffect(() => model.widthPx.set(stripSize.width), [model, stripSize.width]);
  useAddress(model, PLAIN_SETUP);
  const signal = model.capture.signals.find((each) => each.index === index) ?? model.capture.signals[0]!;
  const { taken, trouble } = useTaken(model, signal);
  const shown = useMemo(() => (taken === null ? null : spectrumOf(taken, windowName)), [taken, windowName]);
  const speed = useMemo(
    () =>
      taken === null
        ? null
        : crankSpeed(wheel.data ?? null, measurements.data, { from: taken.from, to: taken.to }),
    [taken, wheel.data, measurements.data],
  );
  const highestHz = shown?.highestHz ?? 0;
  const opening = shown === null ? 0 : openingHz(shown);
  // biome-ignore lint/correctness/useExhaustiveDependencies: another window of time keeps the frequencies looked at
  const frequencies = useMemo(
    () =>
      highestHz === 0
        ? null
        : createViewModel(
            { whole: { from: 0, to: highestHz }, least: highestHz / 100_000 },
            { from: 0, to: opening },
          ),
    [highestHz, signal.index],
  );
  const lines = useMemo(() => [{ signal, role: circuitWords(signal.circuit).role, dash: [] }], [signal]);
  const choose = (place: number | null) => {
    setChosen(place);
    const line = place === null ? undefined : shown?.lines[place];
    const view = frequencies?.view.get();
    if (line === undefined || view === undefined || frequencies === null) return;
    if (line.frequencyHz > view.to || line.frequencyHz < view.from) {
      const half = (view.to - view.from) / 2;
      frequencies.show({ from: line.frequencyHz - half, to: line.frequencyHz + half });
    }
  };

  return (
    <div className="capture-flow">
      <CaptureHead
        capture={capture}
        tab="spectrum"
        actions={<CaptureActions capture={capture} />}
        tools={
          <div className="turns-tools spectrum-tools">
            {capture.signals.length > 1 && (
              <select
                className="choice"
                aria-label="Signal"
                value={signal.index}
                onChange={(event) => {
                  setIndex(Number(event.target.value));
                  setChosen(null);
                }}
              >
                {capture.signals.map((each) => (
                  <option key={each.index} value={each.index}>
                    {each.name}
                  </option>
                ))}
              </select>
            )}
            <Segmented<Height>
              label="Amplitude"
              value={height}
              onChange={setHeight}
              options={[
                { value: 'linear', text: 'Linear' },
                { value: 'dB', text: 'dB' },
              ]}
            />
            <select
              className="choice"
              aria-label="Window function"
              value={windowName}
              onChange={(event) => {
                setWindow(WINDOWS.find(([name]) => name === event.target.value)?.[0] ?? 'hann');
                setChosen(null);
              }}
            >
              {WINDOWS.map(([name, text]) => (
                <option key={name} value={name}>
                  {text}
                </option>
              ))}
            </select>
          </div>
        }
      />
      <div className="spectrum-body">
        <section className="spectrum-main" aria-label="Spectrum">
          {trouble !== null && (
            <p className="spectrum-words" role="status">
              {trouble}
            </p>
          )}
          {taken !== null && shown === null && (
            <p className="spectrum-words">
              This window holds too few samples for a spectrum: stretch it in the strip below.
            </p>
          )}
          {shown !== null && frequencies !== null ? (
            <SpectrumPlot
              model={frequencies}
              shown={shown}
              signal={signal}
              height={height}
              orderHz={speed?.hz ?? null}
              chosen={chosen}
              onChoose={choose}
            />
          ) : (
            <div className="skeleton spectrum-wait" />
          )}
          {height === 'dB' && (
            <p className="spectrum-words text-soft">0 dB is an amplitude of 1 {signal.unit}.</p>
          )}
          <div className="spectrum-strip">
            <div ref={strip} />
            <Strip model={model} lines={lines} marks={[]} wheel={wheel.data ?? null} />
          </div>
        </section>
        <aside className="turns-side spectrum-side" aria-label="Lines and how they were made">
          {shown !== null && taken !== null && (
            <SpectrumPanel
              shown={shown}
              taken={taken}
              signal={signal}
              windowName={WINDOWS.find(([name]) => name === windowName)?.[1] ?? ''}
              speed={speed}
              chosen={chosen}
              onChoose={choose}
            />
          )}
        </aside>
      </div>
    </div>
  );
}
