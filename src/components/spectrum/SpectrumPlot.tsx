import { type KeyboardEvent, useId, useRef } from 'react';
import { circuitWords } from '../base/circuits.ts';
import { digitsFor, fixed, withUnit } from '../plot/format.ts';
import { valueTicks } from '../plot/ticks.ts';
import type { PlotSignal } from '../plot/types.ts';
import { useLaneGestures } from '../plot/useLaneGestures.ts';
import { useSize } from '../plot/useSize.ts';
import { useStore } from '../plot/useStore.ts';
import { panBy, shareOfTime, zoomAt } from '../plot/view.ts';
import type { ViewModel } from '../plot/view-model.ts';
import { frequencyScale } from './frequency-scale.ts';
import { reduceSpectrum } from './reduce.ts';
import type { ShownSpectrum } from './spectrum-of.ts';

export type Height = 'linear' | 'dB';

interface SpectrumPlotProps {
  model: ViewModel;
  shown: ShownSpectrum;
  signal: PlotSignal;
  height: Height;
  orderHz: number | null;
  /** Place in the list of lines. */
  chosen: number | null;
  onChoose: (place: number) => void;
}

/** dB down to this far under the strongest. */
const DB_DEPTH = 100;
const nothing = () => {};

/** Amplitude over frequency: orders above where the crank speed is known, hertz below, lines by balloon. */
export function SpectrumPlot({ model, shown, signal, height, orderHz, chosen, onChoose }: SpectrumPlotProps) {
  const summary = useId();
  const hatch = `lobe${useId().replace(/\W/g, '')}`;
  const stageRef = useRef<HTMLDivElement>(null);
  const [stage, size] = useSize<HTMLDivElement>();
  const view = useStore(model.view);
  const cursor = useStore(model.cursorS);
  useLaneGestures(stageRef, model, nothing);
  const { width, height: high } = size;
  const { found, lines, lobeHz, noise } = shown;
  const points = width === 0 ? [] : reduceSpectrum(found, view.from, view.to, Math.round(width));
  const strongest = Math.max(lines[0]?.amplitude ?? 0, ...points.map(([, value]) => value), 1e-300);
  const db = (value: number) => 20 * Math.log10(Math.max(value, 1e-300));
  const top = height === 'dB' ? db(strongest) + 6 : strongest * 1.16;
  const bottom = height === 'dB' ? top - DB_DEPTH : -strongest * 0.02;
  const px = (hz: number) => shareOfTime(view, hz) * width;
  const py = (value: number) =>
    ((top - Math.max(height === 'dB' ? db(value) : value, bottom)) / (top - bottom)) * high;
  const { ticks, step } = valueTicks(height === 'dB' ? bottom : 0, top, 4);
  const tickText = (tick: number) =>
    height === 'dB' ? `${fixed(tick, 0)} dB` : withUnit(fixed(tick, digitsFor(step)), signal.unit);
  const orders = orderHz === null || width === 0 ? null : frequencyScale(view, width, orderHz);
  const hertz = width === 0 ? null : frequencyScale(view, width);
  const focus = chosen === null ? undefined : lines[chosen];
  const under = cursor === null ? undefined : found.amplitude[Math.round(cursor / found.stepHz)];

  const keys = (event: KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const length = view.to - view.from;
    const middle = (view.from + view.to) / 2;
    const sign = event.key === 'ArrowLeft' ? -1 : 1;
    if (event.key === 'ArrowLeft' || event.key === 'ArrowRight') {
      if (event.shiftKey) model.cursorS.set(Math.max((cursor ?? middle) + (sign * length) / 200, 0));
      else model.show(panBy(view, (sign * length) / 10, model.bounds));
    } else if (event.key === '+' || event.key === '=')
      model.show(zoomAt(view, focus?.frequencyHz ?? middle, 0.6, model.bounds));
    else if (event.key === '-') model.show(zoomAt(view, middle, 1 / 0.6, model.bounds));
    else if (event.key === '0') model.show(model.bounds.whole);
    else if ((event.key === 'n' || event.key === 'p') && lines.length > 0) {
      const by = event.key === 'n' ? 1 : -1;
      onChoose(chosen === null ? 0 : (chosen + by + lines.length) % lines.length);
    } else return;
    event.preventDefault();
  };

  return (
    <div
      className="spectrum-plot"
      role="application"
      aria-label={`Spectrum of ${signal.name}`}
      aria-describedby={summary}
      // biome-ignore lint/a11y/noNoninteractiveTabindex: the plot takes keys of its own while it has focus
      tabIndex={0}
      data-own-keys
      onKeyDown={keys}
    >
      <span className="spectrum-axis">{orders === null ? '' : 'order'}</span>
      <div className="spectrum-scale">{orders !== null && <Across scale={orders} width={width} above />}</div>
      <div className="spectrum-ticks" aria-hidden="true">
        {ticks.map((tick) => (
          <span key={tick} style={{ top: ((top - tick) / (top - bottom)) * high }}>
            {tickText(tick)}
          </span>
        ))}
      </div>
      <div
        ref={(element) => {
          stage.current = element;
          stageRef.current = element;
        }}
        className="spectrum-stage"
      >
        <svg width={width} height={high} aria-hidden="true">
          <defs>
            <pattern
              id={hatch}
              width="7"
              height="7"
              patternUnits="userSpaceOnUse"
              patternTransform="rotate(45)"
            >
              <path className="plot-hatch" d="M0 0V7" />
            </pattern>
          </defs>
          {focus !== undefined && (
            <rect
              x={px(focus.frequencyHz - lobeHz)}
              width={Math.max(px(focus.frequencyHz + lobeHz) - px(focus.frequencyHz - lobeHz), 1)}
              y={0}
              height={high}
              fill={`url(#${hatch})`}
            />
          )}
          {orders?.labels.map(
            ({ at, text }) =>
              Number.isInteger(Number(text)) && (
                <path
                  key={text}
                  className={Number(text) % 2 === 0 ? 'spectrum-order spectrum-even' : 'spectrum-order'}
                  d={`M${at.toFixed(1)} 0V${high}`}
                />
              ),
          )}
          {noise > 0 && <path className="spectrum-noise" d={`M0 ${py(4 * noise).toFixed(1)}H${width}`} />}
          <path
            className={`spectrum-line role-${circuitWords(signal.circuit).role}`}
            d={points
              .map(([hz, value], i) => `${i === 0 ? 'M' : 'L'}${px(hz).toFixed(1)} ${py(value).toFixed(1)}`)
              .join('')}
          />
          {cursor !== null && <path className="plot-overlay-cursor" d={`M${px(cursor)} 0V${high}`} />}
        </svg>
        {lines.map((line, place) => {
          const x = px(line.frequencyHz);
          if (x < 0 || x > width) return null;
          return (
            <button
              key={line.frequencyHz}
              type="button"
              className="balloon spectrum-balloon"
              aria-label={`Line ${place + 1}, ${fixed(line.frequencyHz, 2)} Hz`}
              aria-pressed={chosen === place}
              style={{ left: x, top: Math.max(py(line.amplitude) - 18, 14) }}
              onClick={() => onChoose(place)}
            >
              {place + 1}
            </button>
          );
        })}
        {cursor !== null && under !== undefined && (
          <div
            className="plot-cursor-tag spectrum-tag"
            style={
              px(cursor) > width - 150
                ? { right: width - px(cursor) + 4, left: 'auto' }
                : { left: px(cursor) + 4 }
            }
            aria-hidden="true"
          >
            {fixed(cursor, digitsFor((view.to - view.from) / 1000))} Hz
            {orderHz !== null && `, order ${fixed(cursor / orderHz, 2)}`}
            <br />
            {withUnit(fixed(under, digitsFor(strongest / 1000)), signal.unit)}
          </div>
        )}
      </div>
      <span className="spectrum-axis spectrum-axis-low">Hz</span>
      <div className="spectrum-scale">{hertz !== null && <Across scale={hertz} width={width} />}</div>
      <p id={summary} className="sr-only">
        {lines.length === 0
          ? 'No line stands out of the noise.'
          : `${lines.length} lines; the strongest at ${fixed(lines[0]!.frequencyHz, 2)} Hz.`}{' '}
        n and p go through the lines.
      </p>
    </div>
  );
}

function Across({
  scale,
  width,
  above = false,
}: {
  scale: ReturnType<typeof frequencyScale>;
  width: number;
  above?: boolean;
}) {
  const barY = above ? 20 : 2;
  const box = (dark: boolean) =>
    scale.fields
      .filter((field) => field.dark === dark)
      .map(({ from, to }) => `M${from.toFixed(1)} ${barY}H${to.toFixed(1)}v6H${from.toFixed(1)}z`)
      .join('');
  return (
    <svg aria-hidden="true" width={width} height={30}>
      <path className="plot-field" d={box(false)} />
      <path className="plot-field plot-field-dark" d={box(true)} />
      {scale.labels.map(({ at, text }) => (
        <text
          key={text}
          className="plot-label"
          x={Math.min(Math.max(at, text.length * 3.4), width - text.length * 3.4)}
          y={above ? 13 : 23}
          textAnchor="middle"
        >
          {text}
        </text>
      ))}
    </svg>
  );
}
