import { type Lane, stackHeight, yOf } from './lanes.ts';
import type { PlotMark, View } from './types.ts';
import { shareOfTime } from './view.ts';

/** Where a mark stands in the stack, in pixels. */
export interface PlacedMark {
  readonly mark: PlotMark;
  readonly number: number;
  readonly balloon: { readonly x: number; readonly y: number };
  /** What the leader points at. */
  readonly point: { readonly x: number; readonly y: number };
  readonly range: {
    readonly from: number;
    readonly to: number;
    readonly top: number;
    readonly height: number;
  } | null;
  readonly level: number | null;
  /** Text to the left of the balloon when there is no room at the right. */
  readonly side: 'left' | 'right';
  readonly room: number;
}

const ROW = 30;
const LETTER = 6.6;

/**
 * Balloons stand at the top of their lane, one row lower where two would cover each other; dimension lines stand at the
 * bottom, so the two never meet. Marks outside the view are left out.
 */
export function placeMarks(
  marks: readonly PlotMark[],
  lanes: readonly Lane[],
  view: View,
  width: number,
): PlacedMark[] {
  if (lanes.length === 0 || width === 0) return [];
  const taken: { lane: number; row: number; from: number; to: number }[] = [];
  return marks.flatMap((mark, place) => {
    const to = mark.to ?? mark.from;
    const always = mark.kind === 'level';
    if (!always && (to < view.from || mark.from > view.to)) return [];
    const lane = lanes.find((each) => each.signal.index === mark.signal);
    if (mark.signal !== null && lane === undefined) return [];
    const top = lane?.top ?? 0;
    const height = lane?.height ?? stackHeight(lanes);
    const px = (timeS: number) => shareOfTime(view, timeS) * width;
    const middle = mark.kind === 'range' ? (px(mark.from) + px(to)) / 2 : px(mark.from);
    const x = Math.min(Math.max(middle, 16), width - 16);
    const textWidth = Math.min(mark.text.length * LETTER + 8, 240);
    const side = x + 20 + textWidth > width && x - 20 - textWidth > 0 ? 'left' : 'right';
    const reach =
      side === 'right' ? { from: x - 16, to: x + 20 + textWidth } : { from: x - 20 - textWidth, to: x + 16 };
    let row = 0;
    const lanePlace = lane === undefined ? -1 : lane.signal.index;
    while (taken.some((t) => t.lane === lanePlace && t.row === row && t.from < reach.to && t.to > reach.from))
      row += 1;
    taken.push({ lane: lanePlace, row, ...reach });
    const value = mark.value !== null && lane ? yOf(lane, mark.value) : null;
    const inside = value === null ? top + height / 2 : Math.min(Math.max(value, top + 4), top + height - 4);
    return [
      {
        mark,
        number: place + 1,
        balloon: { x, y: Math.min(top + 24 + row * ROW, top + height - 14) },
        point: { x: middle, y: inside },
        range: mark.kind === 'range' ? { from: px(mark.from), to: px(to), top, height } : null,
        level: mark.kind === 'level' ? value : null,
        side,
        room: side === 'right' ? width - x - 22 : x - 22,
      } satisfies PlacedMark,
    ];
  });
}
