import 'uplot/dist/uPlot.min.css';
import './plot.css';
import {
  type KeyboardEvent,
  lazy,
  type ReactNode,
  Suspense,
  useCallback,
  useEffect,
  useId,
  useMemo,
  useState,
} from 'react';
import { circuitWords } from '../base/circuits.ts';
import { Cursor } from './Cursor.tsx';
import { dashes } from './dashes.ts';
import { Gutter } from './Gutter.tsx';
import { type LaneSetup, PLAIN_SETUP, shownIn } from './lane-setup.ts';
import { type Lane, type LaneLine, laneAtY, layLanes, stackHeight, valueAtY } from './lanes.ts';
import { Balloons } from './Marks.tsx';
import { placeMarks } from './mark-layout.ts';
import type { PlotModel } from './model.ts';
import { Overlay } from './Overlay.tsx';
import { PlotSummary } from './PlotSummary.tsx';
import { actOnKey } from './plot-keys.ts';
import { ScaleBar, type ScaleKind } from './ScaleBar.tsx';
import { SpanHandles } from './Span.tsx';
import { Strip } from './Strip.tsx';
import { nearestValue } from './span-statistics.ts';
import { Trace } from './Trace.tsx';
import type { PlotEvidence, PlotMark, PlotWheel } from './types.ts';
import { type Placed, useLaneGestures } from './useLaneGestures.ts';
import { useSize } from './useSize.ts';
import { useStore } from './useStore.ts';

const SpanFigures = lazy(() => import('./SpanFigures.tsx').then((m) => ({ default: m.SpanFigures })));
const KeysDialog = lazy(() => import('./KeysDialog.tsx').then((m) => ({ default: m.KeysDialog })));

/** A place on the trace that a person chose for a mark, in the trace's own time and value. */
export interface MarkPlace {
  readonly kind: 'point' | 'range';
  readonly signal: number | null;
  readonly from: number;
  readonly to: number | null;
  readonly value: number | null;
}

export interface PlotProps {
  model: PlotModel;
  wheel: PlotWheel | null;
  scale: ScaleKind;
  marks?: readonly PlotMark[];
  chosenMark?: string | null;
  evidence?: PlotEvidence | null;
  setup?: LaneSetup;
  /** Signals whose lanes are hidden, where nothing else of the lanes is set. */
  hidden?: ReadonlySet<number>;
  /** Between and over the lanes, at the top left of the stack: what sets their heights. */
  grips?: (lanes: readonly Lane[]) => ReactNode;
  /** Above the lanes, over the whole stage: what moves the chosen mark. */
  handles?: ReactNode;
  onPlace?: (place: MarkPlace) => void;
  onChooseMark?: (id: string) => void;
  /** Called once when the first trace stands. */
  onDrawn?: () => void;
}

const NO_MARKS: readonly PlotMark[] = [];
const NARROW_PX = 640;

/** Lanes on one time axis with the scale above and the whole capture below. */
export function Plot(props: PlotProps) {
  const {
    model,
    wheel,
    scale,
    evidence = null,
    marks = NO_MARKS,
    setup: given = PLAIN_SETUP,
    hidden,
    onPlace,
    onDrawn,
  } = props;
  const setup = useMemo(() => (hidden === undefined ? given : { ...given, hidden }), [given, hidden]);
  const summary = useId();
  const [help, setHelp] = useState(false);
  const [outer, outerSize] = useSize<HTMLDivElement>();
  const [frame, frameSize] = useSize<HTMLDivElement>();
  const [stage, stageSize] = useSize<HTMLDivElement>();
  const loaded = useStore(model.loader.state);
  const view = useStore(model.view);
  const tool = useStore(model.tool);
  const span = useStore(model.span);
  const { overview } = loaded.cache;
  const narrow = outerSize.width > 0 && outerSize.width < NARROW_PX;
  const width = stageSize.width;

  const lines = useMemo<LaneLine[]>(() => {
    const dash = dashes(model.capture.signals.map((signal) => signal.circuit));
    const places = new Map(model.capture.signals.map(({ index }, place) => [index, place]));
    return shownIn(model.capture.signals, setup).map((signal) => ({
      signal,
      role: signal.plain ? 'ink' : circuitWords(signal.circuit).role,
      dash: signal.plain ? [] : (dash[places.get(signal.index) ?? 0] ?? []),
    }));
  }, [model, setup]);
  const lanes = useMemo(
    () => layLanes(lines, frameSize.height, overview, setup),
    [lines, frameSize.height, overview, setup],
  );
  const height = stackHeight(lanes);
  const placed = placeMarks(marks, lanes, view, width);

  useEffect(() => model.widthPx.set(width), [model, width]);
  useEffect(() => {
    if (overview === null || onDrawn === undefined) return;
    const frameId = requestAnimationFrame(() => requestAnimationFrame(onDrawn));
    return () => cancelAnimationFrame(frameId);
  }, [overview, onDrawn]);

  const place = useCallback(
    (at: Placed) => {
      const lane = laneAtY(lanes, at.y);
      const value = lane === null ? null : valueAtY(lane, at.y);
      onPlace?.({
        kind: at.dragged ? 'range' : 'point',
        signal: lane?.signal.index ?? null,
        from: at.from,
        to: at.dragged ? at.to : null,
        value: at.dragged || lane === null ? null : (onTrace(model, lane.signal, at.from) ?? value),
      });
    },
    [lanes, model, onPlace],
  );
  useLaneGestures(stage, model, place);

  const markHere = () => {
    const at = model.cursorS.get() ?? (view.from + view.to) / 2;
    const lane = lanes[0];
    const value = lane === undefined ? null : onTrace(model, lane.signal, at);
    onPlace?.({ kind: 'point', signal: lane?.signal.index ?? null, from: at, to: null, value });
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey || event.defaultPrevented) return;
    if ((event.target as HTMLElement).closest('button, input, textarea, dialog') !== null) return;
    const actions = { mark: markHere, help: () => setHelp(true) };
    if (actOnKey(event.key, event.shiftKey, model, actions)) event.preventDefault();
  };

  return (
    <div ref={outer} className={narrow ? 'plot plot-narrow' : 'plot'}>
      <div
        className="plot-focus"
        role="application"
        aria-label={`Trace of ${lines.map((line) => line.signal.name).join(', ')}`}
        aria-describedby={summary}
        // biome-ignore lint/a11y/noNoninteractiveTabindex: the plot takes keys of its own while it has focus
        tabIndex={0}
        data-own-keys
        onKeyDown={onKeyDown}
      >
        <ScaleBar model={model} wheel={wheel} kind={scale} narrow={narrow} />
        <div
          ref={frame}
          className="plot-frame"
          // Where the lanes do not fit they scroll, and what scrolls must be reached by keys.
          {...(height > frameSize.height + 1 ? { tabIndex: 0, role: 'group', 'aria-label': 'Lanes' } : {})}
        >
          <div className="plot-stack" style={{ height }}>
            <Gutter lanes={lanes} narrow={narrow} />
            <div ref={stage} className={`plot-stage plot-tool-${tool}`} style={{ height }}>
              {width > 0 &&
                lanes.map((lane) => (
                  <Trace key={lane.signal.index} lane={lane} width={width} model={model} />
                ))}
              <Overlay
                model={model}
                lanes={lanes}
                wheel={scale === 'degrees' ? wheel : null}
                placed={placed}
                evidence={evidence}
                view={view}
                width={width}
              />
              <Cursor model={model} lanes={lanes} wheel={wheel} width={width} />
              <SpanHandles model={model} height={height} />
              {props.handles}
              <Balloons
                placed={placed}
                chosen={props.chosenMark ?? null}
                narrow={narrow}
                onChoose={(id) => props.onChooseMark?.(id)}
              />
            </div>
            {props.grips?.(lanes)}
          </div>
          {lanes.length === 0 && (
            <p className="plot-empty">Every lane is hidden. Choose a signal above to see it.</p>
          )}
        </div>
        <Strip model={model} lines={lines} marks={marks} wheel={wheel} />
      </div>
      <Suspense fallback={null}>
        {span !== null && <SpanFigures model={model} lanes={lanes} wheel={wheel} />}
      </Suspense>
      {loaded.trouble !== null && (
        <p className="plot-trouble" role="status">
          {loaded.trouble}
        </p>
      )}
      <PlotSummary id={summary} model={model} lanes={lanes} />
      <Suspense fallback={null}>{help && <KeysDialog onClose={() => setHelp(false)} />}</Suspense>
    </div>
  );
}

/** The trace's own value at a time, where the samples are at hand. */
function onTrace(
  model: PlotModel,
  signal: PlotModel['capture']['signals'][number],
  timeS: number,
): number | null {
  const window = model.loader.best(model.view.get(), model.devicePixels());
  return window === null ? null : nearestValue(window, signal, timeS);
}
