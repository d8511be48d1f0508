import 'uplot/dist/uPlot.min.css';
import './plot.css';
import { type KeyboardEvent, useEffect, useId, useMemo, useRef } from 'react';
import { circuitWords } from '../base/circuits.ts';
import { digitsFor, fixed } from './format.ts';
import { Gutter } from './Gutter.tsx';
import { type Lane, yOf } from './lanes.ts';
import {
  createOverlayCanvas,
  type OverlayCanvas,
  type OverlayData,
  overlayExtent,
} from './overlay-canvas.ts';
import { plainDegreeScale } from './plain-degree-scale.ts';
import { laneRange } from './ticks.ts';
import { timeScale } from './time-scale.ts';
import type { PlotSignal, View } from './types.ts';
import { useLaneGestures } from './useLaneGestures.ts';
import { useSize } from './useSize.ts';
import { useStore } from './useStore.ts';
import { boundsOf, panBy, shareOfTime, zoomAt } from './view.ts';
import { createViewModel, type ViewModel } from './view-model.ts';

interface OverlayPlotProps {
  axis: 'deg' | 's';
  data: OverlayData;
  signal: Pick<PlotSignal, 'name' | 'circuit' | 'unit'>;
  /** Stretches where the two part: hatched. */
  parts: readonly View[];
  /** What the plot shows, in words. */
  summary: string;
}

const nothing = () => {};

/** Two traces laid on each other over crank degrees or seconds, with what differs hatched. */
export function OverlayPlot({ axis, data, signal, parts, summary }: OverlayPlotProps) {
  const summaryId = useId();
  const pattern = `parts${useId().replace(/\W/g, '')}`;
  const host = useRef<HTMLDivElement>(null);
  const canvas = useRef<OverlayCanvas | null>(null);
  const [outer, outerSize] = useSize<HTMLDivElement>();
  const [stage, { width, height }] = useSize<HTMLDivElement>();
  const { role } = circuitWords(signal.circuit);
  const model = useMemo<ViewModel>(
    () => createViewModel(boundsOf(data.start, data.step * (data.here.length - 1), data.here.length)),
    [data],
  );
  const view = useStore(model.view);
  const cursor = useStore(model.cursorS);
  const range = useMemo(() => {
    const { lowest, highest } = overlayExtent(data);
    return laneRange(lowest, highest);
  }, [data]);
  useLaneGestures(stage, model, nothing);

  useEffect(() => {
    if (host.current === null) return;
    const made = createOverlayCanvas(host.current, model, data, role, range);
    canvas.current = made;
    return () => made.close();
  }, [model, data, role, range]);
  useEffect(() => canvas.current?.resize(width, height), [width, height]);

  const keys = (event: KeyboardEvent) => {
    const length = view.to - view.from;
    const middle = (view.from + view.to) / 2;
    if (event.key === 'ArrowLeft') model.show(panBy(view, -length / 10, model.bounds));
    else if (event.key === 'ArrowRight') model.show(panBy(view, length / 10, model.bounds));
    else if (event.key === '+' || event.key === '=') model.show(zoomAt(view, middle, 0.6, model.bounds));
    else if (event.key === '-') model.show(zoomAt(view, middle, 1 / 0.6, model.bounds));
    else if (event.key === '0') model.show(model.bounds.whole);
    else return;
    event.preventDefault();
  };
  const narrow = outerSize.width > 0 && outerSize.width < 640;
  const lane: Lane = {
    signal: { ...signal, index: 0, factor: 1, offset: 0 },
    role,
    dash: [],
    top: 0,
    height,
    ...range,
    inverted: false,
  };
  const scale =
    axis === 'deg' ? plainDegreeScale(view, Math.max(width, 1)) : timeScale(view, Math.max(width, 1));
  const box = (dark: boolean) =>
    scale.fields
      .filter((field) => field.dark === dark)
      .map(({ from, to }) => `M${from.toFixed(1)} 22H${to.toFixed(1)}v7H${from.toFixed(1)}z`)
      .join('');
  const px = (at: number) => shareOfTime(view, at) * width;
  return (
    <div ref={outer} className={narrow ? 'plot plot-narrow' : 'plot'}>
      <div
        className="plot-focus"
        role="application"
        aria-label={`${signal.name}, here and reference`}
        aria-describedby={summaryId}
        // biome-ignore lint/a11y/noNoninteractiveTabindex: the plot takes keys of its own while it has focus
        tabIndex={0}
        data-own-keys
        onKeyDown={keys}
      >
        <div className="plot-scale plot-scale-low">
          {!narrow && (
            <span className="plot-scale-name plot-scale-low-name">{axis === 'deg' ? 'crank' : 'time'}</span>
          )}
          <svg aria-hidden="true" className="plot-scale-svg" width={width} height={38}>
            <path className="plot-field" d={box(false)} />
            <path className="plot-field plot-field-dark" d={box(true)} />
            <path className="plot-tick" d={scale.ticks.map((at) => `M${at.toFixed(1)} 29v4`).join('')} />
            {scale.labels.map(({ at, text }) => (
              <text
                key={text}
                className="plot-label"
                x={narrow ? Math.max(at, text.length * 3.6) : at}
                y={15}
                textAnchor="middle"
              >
                {text}
              </text>
            ))}
          </svg>
        </div>
        <div className="plot-frame">
          <div className="plot-stack plot-stack-full">
            <Gutter lanes={[lane]} narrow={narrow} />
            <div ref={stage} className="plot-stage plot-stage-full">
              <div ref={host} className="plot-lane plot-lane-full" aria-hidden="true" />
              <svg className="plot-overlay" width={width} height={height} aria-hidden="true">
                <defs>
                  <pattern
                    id={pattern}
                    width="7"
                    height="7"
                    patternUnits="userSpaceOnUse"
                    patternTransform="rotate(45)"
                  >
                    <path className="plot-hatch-bad" d="M0 0V7" />
                  </pattern>
                </defs>
                {parts.map((part) => (
                  <rect
                    key={part.from}
                    x={px(part.from)}
                    y={0}
                    width={Math.max(px(part.to) - px(part.from), 2)}
                    height={height}
                    fill={`url(#${pattern})`}
                  />
                ))}
                {axis === 'deg' && (
                  <path
                    className="plot-chain"
                    d={[0, 360, 720].map((at) => `M${px(at).toFixed(1)} 0v${height}`).join('')}
                  />
                )}
                {cursor !== null && <path className="plot-overlay-cursor" d={`M${px(cursor)} 0v${height}`} />}
              </svg>
              {cursor !== null && cursor >= view.from && cursor <= view.to && (
                <CursorValues data={data} at={cursor} axis={axis} lane={lane} x={px(cursor)} width={width} />
              )}
            </div>
          </div>
        </div>
      </div>
      <p id={summaryId} className="sr-only">
        {summary}
      </p>
    </div>
  );
}

interface CursorValuesProps {
  data: OverlayData;
  at: number;
  axis: 'deg' | 's';
  lane: Lane;
  x: number;
  width: number;
}

function CursorValues({ data, at, axis, lane, x, width }: CursorValuesProps) {
  const place = Math.round((at - data.start) / data.step);
  const digits = digitsFor((lane.high - lane.low) / 1000);
  const text = (value: number | null | undefined) => (value == null ? 'none' : fixed(value, digits));
  const here = data.here[place];
  const y = here == null ? 24 : yOf(lane, here);
  return (
    <div
      className={`plot-cursor-tag plot-overlay-tag ${x > width - 170 ? 'plot-cursor-left' : ''}`}
      style={{
        transform: `translate(${x > width - 170 ? x - width : x}px, ${Math.min(Math.max(y - 30, 2), lane.height - 44)}px)`,
      }}
      aria-hidden="true"
    >
      {axis === 'deg' ? `${fixed(at, 1)}°` : `${fixed(at, 5)} s`}
      <br />
      here {text(here)}, reference {text(data.reference[place])} {lane.signal.unit}
    </div>
  );
}
