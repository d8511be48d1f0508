import { type KeyboardEvent, type PointerEvent, useEffect, useMemo, useRef, useState } from 'react';
import { circuitWords } from '../base/circuits.ts';
import { onThemeChange } from '../plot/colours.ts';
import { dashes } from '../plot/dashes.ts';
import type { DecodedWindow } from '../plot/decode-window.ts';
import { timeAtDegrees } from '../plot/degrees.ts';
import { digitsFor, fixed, withUnit } from '../plot/format.ts';
import { plainDegreeScale } from '../plot/plain-degree-scale.ts';
import { valueUnder } from '../plot/span-statistics.ts';
import { timeScale } from '../plot/time-scale.ts';
import type { PlotCapture, PlotWheel, View } from '../plot/types.ts';
import { useSize } from '../plot/useSize.ts';
import { drawLines, drawShade, type RowDrawing, type RowLine, rowsExtent } from './row-canvas.ts';
import type { Rows, TurnRow } from './rows-of.ts';
import type { Laid } from './TurnsTools.tsx';

interface TurnRowsProps {
  captureId: string;
  capture: PlotCapture;
  rows: Rows;
  windows: readonly (DecodedWindow | null)[];
  wheel: PlotWheel | null;
  laid: Laid;
  /** Signals drawn, the one whose values are told first. */
  shown: readonly number[];
  /** Where the column stands across, in degrees or seconds; a stretch when a number was chosen. */
  column: View | null;
  onColumn: (column: View | null) => void;
  onWidth: (px: number) => void;
}

/** The rows with the scale above, one column through all of them, and what each row tells beside it. */
export function TurnRows(props: TurnRowsProps) {
  const { captureId, capture, rows, windows, wheel, laid, shown, column, onColumn, onWidth } = props;
  const { axis, across } = rows;
  const [scaleRef, { width }] = useSize<HTMLDivElement>();
  useEffect(() => onWidth(width), [width, onWidth]);
  const theme = useTheme();

  const lines = useMemo<RowLine[]>(() => {
    const dash = dashes(capture.signals.map((signal) => signal.circuit));
    return shown.flatMap((index) => {
      const place = capture.signals.findIndex((signal) => signal.index === index);
      const signal = capture.signals[place];
      const extent = signal === undefined ? null : rowsExtent(windows, signal);
      if (signal === undefined || extent === null) return [];
      return [{ signal, role: circuitWords(signal.circuit).role, dash: dash[place] ?? [], ...extent }];
    });
  }, [capture, windows, shown]);
  const drawing: RowDrawing = { axis, across, wheel, holds: capture.axis === 'holds', lines };
  const layers = rows.rows.flatMap((row, place) => {
    const window = windows[place];
    return window == null ? [] : [{ row, window }];
  });
  const whole = layers.filter(({ row }) => row.part === null);
  const share = (at: number) => ((at - across.from) / (across.to - across.from)) * 100;
  const first = lines[0];

  const point = (event: PointerEvent<HTMLElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    const at = across.from + ((event.clientX - box.left) / box.width) * (across.to - across.from);
    onColumn({ from: at, to: at });
  };
  const keys = (event: KeyboardEvent) => {
    const sign = event.key === 'ArrowLeft' ? -1 : event.key === 'ArrowRight' ? 1 : 0;
    if (event.key === 'Escape') onColumn(null);
    if (sign === 0) return;
    event.preventDefault();
    const step = (across.to - across.from) / (event.shiftKey ? 20 : 360);
    const at = (column === null ? (across.from + across.to) / 2 : column.from) + sign * step;
    const inside = Math.min(Math.max(at, across.from), across.to);
    onColumn({ from: inside, to: inside });
  };
  const values = (row: TurnRow, window: DecodedWindow | null | undefined): string => {
    if (column === null || window == null || first === undefined) return '';
    const timeS =
      axis === 's'
        ? row.origin + column.from
        : wheel === null
          ? null
          : timeAtDegrees(wheel, row.origin + column.from);
    const under =
      timeS === null || timeS < row.stretch.from || timeS > row.stretch.to
        ? null
        : valueUnder(window, first.signal, timeS);
    if (under === null) return 'not recorded';
    const digits = digitsFor((first.high - first.low) / 1000);
    const [low, high] = [fixed(under.lowest, digits), fixed(under.highest, digits)];
    return withUnit(low === high ? low : `${low} to ${high}`, first.signal.unit);
  };
  const columnStyle =
    column === null
      ? undefined
      : { left: `${share(column.from)}%`, width: `${Math.max(share(column.to) - share(column.from), 0)}%` };
  const columnLine = columnStyle && <i className="turns-column" style={columnStyle} />;
  const dense = rows.rows.length > 30 || laid === 'shade';

  return (
    <div className={dense ? 'turns-stack turns-dense' : 'turns-stack'}>
      <div className="turns-row turns-scale-row">
        <span className="turns-name turns-axis">{axis === 'deg' ? 'crank' : 'time'}</span>
        <div
          ref={scaleRef}
          className="turns-scale"
          role="slider"
          tabIndex={0}
          aria-label="Column through all rows"
          aria-valuemin={across.from}
          aria-valuemax={across.to}
          aria-valuenow={column?.from ?? across.from}
          aria-valuetext={column === null ? 'none' : placeText(axis, column)}
          onKeyDown={keys}
          onPointerDown={(event) => {
            event.currentTarget.setPointerCapture(event.pointerId);
            point(event);
          }}
          onPointerMove={(event) => event.buttons === 1 && point(event)}
        >
          {width > 0 && <AcrossScale axis={axis} across={across} width={width} />}
          {column !== null && (
            <b
              className="turns-column-tag"
              style={{ left: `${Math.min(Math.max(share(column.from), 4), 96)}%` }}
            >
              {placeText(axis, column)}
            </b>
          )}
        </div>
        <span className="turns-figures turns-figures-head">
          <span>{axis === 'deg' ? 'speed' : 'begins'}</span>
          {first !== undefined && <span>{first.signal.name} at the column</span>}
        </span>
      </div>
      {laid !== 'one' && (
        <ol>
          {rows.rows.map((row, place) => {
            const window = windows[place];
            return (
              <li key={`${row.name} ${row.stretch.from}`} className="turns-row">
                <span className="turns-name">
                  <b>{row.name}</b> <span className="figures">{fixed(row.stretch.from, 3)} s</span>
                </span>
                <a
                  className="turns-trace"
                  href={addressOf(captureId, row, column, axis, wheel)}
                  aria-label={`${row.name}: show its samples in the trace`}
                  onPointerMove={(event) => event.pointerType === 'mouse' && point(event)}
                >
                  {row.part !== null && <Missing row={row} rows={rows} wheel={wheel} share={share} />}
                  <RowCanvas
                    drawing={drawing}
                    layers={window == null ? [] : [{ row, window }]}
                    shade={laid === 'shade'}
                    width={width}
                    theme={theme}
                  />
                  {columnLine}
                </a>
                <span className="turns-figures figures">
                  <span>{axis === 'deg' ? speedText(row, rows) : `${fixed(row.stretch.from, 4)} s`}</span>
                  <span>{values(row, window)}</span>
                </span>
              </li>
            );
          })}
        </ol>
      )}
      {laid !== 'shade' && whole.length > 1 && (
        <div className={laid === 'one' ? 'turns-row turns-all turns-all-high' : 'turns-row turns-all'}>
          <span className="turns-name">
            <b>All</b> <span className="figures">n = {whole.length}</span>
          </span>
          <div
            className="turns-trace"
            onPointerMove={(event) => event.pointerType === 'mouse' && point(event)}
          >
            <RowCanvas drawing={drawing} layers={whole} shade={false} width={width} theme={theme} />
            {columnLine}
          </div>
          <span className="turns-figures" />
        </div>
      )}
    </div>
  );
}

interface RowCanvasProps {
  drawing: RowDrawing;
  layers: readonly { row: TurnRow; window: DecodedWindow }[];
  shade: boolean;
  width: number;
  theme: number;
}

function RowCanvas({ drawing, layers, shade, width, theme }: RowCanvasProps) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const key = `${layers.map(({ row, window }) => `${row.name}${window.from}${window.count}`).join()} ${drawing.lines
    .map(({ signal, low, high }) => `${signal.index} ${low} ${high}`)
    .join()} ${drawing.axis} ${drawing.across.from} ${drawing.across.to}`;
  // biome-ignore lint/correctness/useExhaustiveDependencies: the key names everything that is drawn
  useEffect(() => {
    const [only] = layers;
    if (canvas.current === null || width === 0) return;
    if (shade && only !== undefined) drawShade(canvas.current, drawing, only);
    else drawLines(canvas.current, drawing, layers);
    canvas.current.dataset.drawn = String(layers.length);
  }, [key, shade, width, theme]);
  return <canvas ref={canvas} />;
}

/** What was not recorded of a part turn. */
function Missing({
  row,
  rows,
  wheel,
  share,
}: {
  row: TurnRow;
  rows: Rows;
  wheel: PlotWheel | null;
  share: (at: number) => number;
}) {
  const ends = wheel === null ? [] : [wheel.teethDeg[0]! - row.origin, wheel.teethDeg.at(-1)! - row.origin];
  const from = row.part === 'start' ? rows.across.from : Math.max(ends[1] ?? 0, rows.across.from);
  const to = row.part === 'start' ? Math.min(ends[0] ?? 0, rows.across.to) : rows.across.to;
  return (
    <i className="turns-missing" style={{ left: `${share(from)}%`, width: `${share(to) - share(from)}%` }}>
      {share(to) - share(from) > 25 &&
        (row.part === 'start' ? 'before the capture starts' : 'after the capture ends')}
    </i>
  );
}

function AcrossScale({ axis, across, width }: { axis: Rows['axis']; across: View; width: number }) {
  const scale = axis === 'deg' ? plainDegreeScale(across, width) : timeScale(across, width);
  const box = (dark: boolean) =>
    scale.fields
      .filter((field) => field.dark === dark)
      .map(({ from, to }) => `M${from.toFixed(1)} 20H${to.toFixed(1)}v7H${from.toFixed(1)}z`)
      .join('');
  return (
    <svg aria-hidden="true" width={width} height={34}>
      <path className="plot-field" d={box(false)} />
      <path className="plot-field plot-field-dark" d={box(true)} />
      <path className="plot-tick" d={scale.ticks.map((at) => `M${at.toFixed(1)} 27v4`).join('')} />
      {scale.labels.map(({ at, text }) => (
        <text
          key={text}
          className="plot-label"
          x={Math.min(Math.max(at, text.length * 3.4), width - text.length * 3.4)}
          y={13}
          textAnchor="middle"
        >
          {text}
        </text>
      ))}
    </svg>
  );
}

function useTheme(): number {
  const [theme, setTheme] = useState(0);
  useEffect(() => onThemeChange(() => setTheme((old) => old + 1)), []);
  return theme;
}

export function placeText(axis: Rows['axis'], column: View): string {
  const text = (at: number) => (axis === 'deg' ? `${fixed(at, 1)}°` : `${fixed(at * 1e3, 2)} ms`);
  return column.to > column.from ? `${text(column.from)} to ${text(column.to)}` : text(column.from);
}

function speedText({ part, stretch }: TurnRow, { across }: Rows): string {
  if (part !== null) return 'part';
  return `${fixed((60 * (across.to / 360)) / (stretch.to - stretch.from), 1)} rpm`;
}

/** The row in the trace; with a column, a twelfth of the row round it. */
function addressOf(
  captureId: string,
  row: TurnRow,
  column: View | null,
  axis: Rows['axis'],
  wheel: PlotWheel | null,
): string {
  const at =
    column === null
      ? null
      : axis === 's'
        ? row.origin + column.from
        : wheel === null
          ? null
          : timeAtDegrees(wheel, row.origin + column.from);
  const { from, to } = row.stretch;
  const inside = at !== null && at >= from && at <= to;
  const half = (to - from) / 24;
  const shown = inside ? { from: at - half, to: at + half } : row.stretch;
  const query = `from=${shown.from.toPrecision(9)}&to=${shown.to.toPrecision(9)}`;
  return `/captures/${captureId}?${query}${inside ? `&at=${at.toPrecision(9)}` : ''}`;
}
