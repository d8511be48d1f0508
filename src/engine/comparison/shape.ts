import type { Overlay, Shape, ShapePart } from './types.ts';

/** Parts of the reference's span by which two traces must part, and for how long, before it is said. */
const APART = 0.2;
const LEAST_LENGTH = { deg: 1, s: 0.00002 } as const;
const MOST_PARTS = 24;

function span(values: readonly (number | null)[]): number {
  let low = Infinity;
  let high = -Infinity;
  for (const value of values) {
    if (value === null) continue;
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  return high - low;
}

/** How far a value lies beyond the band, or from the only reference; 0 inside a band. */
function offAt({ here, reference, low, high }: Overlay, i: number): number | null {
  const a = here[i] ?? null;
  const b = reference[i] ?? null;
  if (a === null || b === null) return null;
  const least = low?.[i] ?? null;
  const most = high?.[i] ?? null;
  if (least === null || most === null) return a - b;
  return a > most ? a - most : a < least ? a - least : 0;
}

/** Where two traces on one axis part by more than a fifth of the reference’s span (beyond the band, where there is one), and the root mean square of the difference. */
export function shapeOf(overlay: Overlay | null): Shape {
  if (!overlay) return { difference: null, parts: [] };
  const { here, reference, start, step, axis } = overlay;
  const scale = span(reference);
  if (!(scale > 0)) return { difference: null, parts: [] };
  let squares = 0;
  let count = 0;
  let since: number | null = null;
  const parts: ShapePart[] = [];
  const close = (end: number) => {
    if (since === null) return;
    const from = start + since * step;
    const to = start + end * step;
    if (to - from >= LEAST_LENGTH[axis]) parts.push({ from, to, axis, text: partText(overlay, since, end) });
    since = null;
  };
  for (let i = 0; i < here.length; i++) {
    const a = here[i] ?? null;
    const b = reference[i] ?? null;
    if (a === null || b === null) {
      close(i);
      continue;
    }
    squares += ((a - b) / scale) ** 2;
    count += 1;
    if (Math.abs(offAt(overlay, i)! / scale) > APART) since ??= i;
    else close(i);
  }
  close(here.length);
  return {
    difference: count > 0 ? Math.sqrt(squares / count) : null,
    parts: parts
      .sort((a, b) => b.to - b.from - (a.to - a.from))
      .slice(0, MOST_PARTS)
      .sort((a, b) => a.from - b.from),
  };
}

function partText(overlay: Overlay, from: number, to: number): string {
  let sum = 0;
  for (let i = from; i < to; i++) sum += (overlay.here[i] ?? 0) - (overlay.reference[i] ?? 0);
  return sum > 0 ? 'higher here' : 'lower here';
}
