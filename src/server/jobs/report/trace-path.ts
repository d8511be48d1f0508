import type { LineData } from '../../../engine/drawing/line-data.ts';

const n = (value: number) => String(Number(value.toFixed(2)));

/**
 * The path of a line, in the words that SVG and PDF writers both take (M and L only). A hole ends the line; a held value steps.
 * Empty when there is nothing to draw.
 */
export function tracePath(
  { xs, ys }: LineData,
  x: (timeS: number) => number,
  y: (value: number) => number,
  holds: boolean,
): string {
  const parts: string[] = [];
  let last: string | null = null;
  ys.forEach((value, place) => {
    if (value === null) {
      last = null;
      return;
    }
    const at = n(x(xs[place]!));
    const height = n(y(value));
    if (last !== null && holds) parts.push(`L${at} ${last}`);
    parts.push(`${last === null ? 'M' : 'L'}${at} ${height}`);
    last = height;
  });
  return parts.join(' ');
}
