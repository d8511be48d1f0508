import { type LaneSetup, PLAIN_SETUP } from '../plot/lane-setup.ts';
import type { View } from '../plot/types.ts';

/** What a copied address opens again: the stretch, the lanes, the span and the cursor. */
export interface Shown {
  readonly view: View | null;
  readonly span: View | null;
  readonly cursorS: number | null;
  readonly setup: LaneSetup;
}

const numberIn = (text: string | null): number | null => {
  const value = text === null || text.trim() === '' ? Number.NaN : Number(text);
  return Number.isFinite(value) ? value : null;
};

function stretch(from: number | null | undefined, to: number | null | undefined): View | null {
  return from != null && to != null && from < to ? { from, to } : null;
}

/**
 * What the address asks for. `lanes=2,0-` shows signals 2 and 0 in this order, the second upside down; others are hidden. What
 * makes no sense, or names a signal that is not there, is left out.
 */
export function shownInAddress(search: string, signals: readonly number[]): Shown {
  const query = new URLSearchParams(search);
  const ends = (query.get('span') ?? '').split(',').map(numberIn);
  return {
    view: stretch(numberIn(query.get('from')), numberIn(query.get('to'))),
    span: stretch(ends[0], ends[1]),
    cursorS: numberIn(query.get('at')),
    setup: setupOf(query.get('lanes'), query.get('scales') === 'common', signals),
  };
}

function setupOf(lanes: string | null, common: boolean, signals: readonly number[]): LaneSetup {
  const wanted = [...(lanes ?? '').matchAll(/(?:^|,)(\d{1,3})(-?)(?=,|$)/g)]
    .map(([, index, minus]) => ({ index: Number(index), inverted: minus === '-' }))
    .filter(({ index }) => signals.includes(index));
  if (wanted.length === 0) return { ...PLAIN_SETUP, common };
  const order = [...new Set(wanted.map(({ index }) => index))];
  return {
    ...PLAIN_SETUP,
    order,
    common,
    hidden: new Set(signals.filter((index) => !order.includes(index))),
    inverted: new Set(wanted.filter(({ inverted }) => inverted).map(({ index }) => index)),
  };
}

/** Nine significant digits are finer than any sample step. */
const short = (value: number) => String(Number(value.toPrecision(9)));

/** The address's query for what is shown; other entries stay. Plain settings leave nothing behind. */
export function addressOf(
  search: string,
  { view, span, cursorS, setup }: Shown,
  signals: readonly number[],
): string {
  const query = new URLSearchParams(search);
  const put = (name: string, text: string | null) =>
    text === null ? query.delete(name) : query.set(name, text);
  put('from', view === null ? null : short(view.from));
  put('to', view === null ? null : short(view.to));
  put('span', span === null ? null : `${short(span.from)},${short(span.to)}`);
  put('at', cursorS === null ? null : short(cursorS));
  put('lanes', lanesText(setup, signals));
  put('scales', setup.common ? 'common' : null);
  return query.toString();
}

function lanesText({ order, hidden, inverted }: LaneSetup, signals: readonly number[]): string | null {
  const all = [...order, ...signals.filter((index) => !order.includes(index))];
  const shown = all.filter((index) => !hidden.has(index));
  const plain =
    inverted.size === 0 && hidden.size === 0 && shown.every((index, place) => index === signals[place]);
  return plain || shown.length === 0
    ? null
    : shown.map((index) => `${index}${inverted.has(index) ? '-' : ''}`).join(',');
}
