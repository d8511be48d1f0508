import { asc, eq } from 'drizzle-orm';
import { decodeWindow } from '../../../engine/drawing/decode-window.ts';
import { digitsFor, fixed, unitText } from '../../../engine/drawing/format.ts';
import { extentOf, lineData } from '../../../engine/drawing/line-data.ts';
import { laneRange, valueTicks } from '../../../engine/drawing/ticks.ts';
import { timeScale } from '../../../engine/drawing/time-scale.ts';
import type { CaptureRecord, MarkRecord } from '../../access.ts';
import { axisJson } from '../../captures/capture-json.ts';
import { captureWheel } from '../../captures/capture-wheel.ts';
import { listMarks } from '../../captures/marks/list-marks.ts';
import { strokeOf } from '../../captures/picture/palette.ts';
import { captureWindow } from '../../captures/window/capture-window.ts';
import { db } from '../../db/client.ts';
import { captureSignal } from '../../db/schema.ts';
import { tracePath } from './trace-path.ts';

/** A trace as lines, letters and numbers on its own grid of units; HTML and PDF draw the same. */
export interface TraceFigure {
  readonly title: string;
  /** What it shows, for those who cannot see it. */
  readonly alt: string;
  readonly caption: string;
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly lanes: readonly TraceLane[];
  readonly times: readonly { readonly at: number; readonly text: string }[];
  readonly marks: readonly { readonly at: number; readonly end: number | null; readonly number: number }[];
}

export interface TraceLane {
  readonly name: string;
  readonly top: number;
  readonly height: number;
  readonly path: string;
  readonly colour: string;
  readonly dash: readonly number[];
  readonly ticks: readonly { readonly at: number; readonly text: string }[];
}

const WIDTH = 500;
const LEFT = 74;
const LANE = 78;
const GAP = 6;
const FOOT = 18;
const HEAD = 16;
const MOST_LANES = 4;
const MOST_MARKS = 12;
/** Turns that are shown where a wheel is known: more would run into one another on paper. */
const TURNS = 1.25;

/** A stretch of a capture that shows what matters: round its marks, else about one turn, else all of it. */
export async function traceFigure(row: CaptureRecord, number: number): Promise<TraceFigure | null> {
  if (row.axis === null || row.samplesVersion === 0) return null;
  const { startS, durationS, axis } = axisJson(row.axis);
  if (!(durationS > 0)) return null;
  const [signals, wheel, marks] = await Promise.all([
    db()
      .select()
      .from(captureSignal)
      .where(eq(captureSignal.captureId, row.id))
      .orderBy(asc(captureSignal.index))
      .limit(MOST_LANES),
    captureWheel(row),
    listMarks(row.id),
  ]);
  const view = viewOf({ from: startS, to: startS + durationS }, wheel?.marksS ?? [], marks);
  const plot = WIDTH - LEFT;
  const answer = await captureWindow(row, {
    ...view,
    columns: plot * 2,
    signals: signals.map(({ index }) => index),
  });
  const window = decodeWindow(
    { get: (name) => answer.headers[name] ?? null },
    answer.body.slice().buffer as ArrayBuffer,
  );
  const x = (timeS: number) => LEFT + ((timeS - view.from) / (view.to - view.from)) * plot;
  const inside = (at: number) => Math.min(Math.max(at, LEFT), WIDTH);
  const lanes = signals.map((signal, place): TraceLane => {
    const top = HEAD + place * (LANE + GAP);
    const extent = extentOf(window, signal, view.from, view.to);
    const { low, high } = laneRange(extent?.lowest ?? Number.NaN, extent?.highest ?? Number.NaN);
    const y = (value: number) => top + ((high - value) / (high - low)) * LANE;
    const { ticks, step } = valueTicks(low, high);
    const { colour, dash } = strokeOf(signal.circuit, 'paper');
    const holds = axis === 'holds';
    return {
      name: signal.name,
      top,
      height: LANE,
      path: tracePath(lineData(window, signal, holds), (timeS) => inside(x(timeS)), y, holds),
      colour,
      dash: dash === undefined ? [] : dash.split(' ').map(Number),
      ticks: ticks.map((tick) => ({
        at: y(tick),
        text: `${fixed(tick, digitsFor(step))} ${unitText(signal.unit)}`.trim(),
      })),
    };
  });
  const shown = marks
    .filter((mark) => (mark.toS ?? mark.fromS) >= view.from && mark.fromS <= view.to)
    .slice(0, MOST_MARKS);
  const stretch = `${fixed(view.from, 3)} to ${fixed(view.to, 3)} s of ${fixed(durationS, 3)} s`;
  const told = shown.map((mark, place) => `${place + 1}: ${mark.text || 'no text'} (${mark.author}).`);
  const names = lanes.map((lane) => lane.name).join(', ');
  return {
    title: `Figure ${number}. ${row.title}`,
    alt: [`Trace of ${names || 'no signal'}, ${stretch}.`, ...told].join(' '),
    caption: [
      `${stretch}; lowest and highest of each column. File ${row.fileName}, SHA-256 ${row.sha256.slice(0, 12)}….`,
      ...told,
    ].join(' '),
    width: WIDTH,
    height: HEAD + lanes.length * (LANE + GAP) + FOOT,
    left: LEFT,
    lanes,
    times: timeScale(view, plot).labels.map(({ at, text }) => ({ at: LEFT + at, text })),
    marks: shown.map((mark, place) => ({
      at: inside(x(mark.fromS)),
      end: mark.toS === null ? null : inside(x(mark.toS)),
      number: place + 1,
    })),
  };
}

interface Stretch {
  readonly from: number;
  readonly to: number;
}

/** Exported for its test. */
export function viewOf(
  all: Stretch,
  marksS: readonly number[],
  marks: readonly Pick<MarkRecord, 'fromS' | 'toS'>[],
): Stretch {
  const [first, second] = [marksS[0], marksS[1]];
  const turn = first !== undefined && second !== undefined ? second - first : null;
  const least = Math.min(all.to - all.from, turn === null ? (all.to - all.from) / 8 : turn * TURNS);
  if (marks.length > 0) {
    const from = Math.min(...marks.map((mark) => mark.fromS));
    const to = Math.max(...marks.map((mark) => mark.toS ?? mark.fromS));
    const span = Math.max(least, (to - from) * 1.2);
    return within(all, (from + to) / 2 - span / 2, span);
  }
  return turn === null || second === undefined ? all : within(all, second - turn * 0.1, least);
}

function within(all: Stretch, from: number, span: number): Stretch {
  const start = Math.max(all.from, Math.min(from, all.to - span));
  return { from: start, to: Math.min(all.to, start + span) };
}
