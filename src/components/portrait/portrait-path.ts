export interface PortraitLike {
  readonly from: number;
  readonly to: number;
  readonly low: number;
  readonly high: number;
  readonly points: readonly (number | null)[];
}

export interface Box {
  readonly width: number;
  readonly height: number;
}

/** Value scale of a picture: lowest and highest of what is drawn in it. */
export interface Scale {
  readonly low: number;
  readonly high: number;
}

const INSET = 2;

/** SVG path of a portrait in a box, holes left out; a flat signal lies in the middle. With a scale several share one height. */
export function portraitPath(
  portrait: PortraitLike,
  { width, height }: Box,
  scale: Scale = portrait,
): string {
  const { points, low, high } = portrait;
  const span = scale.high - scale.low;
  const step = width / Math.max(points.length - 1, 1);
  let path = '';
  let pen = false;
  points.forEach((point, i) => {
    if (point === null) {
      pen = false;
      return;
    }
    const value = low + (point / 255) * (high - low);
    const part = span > 0 ? (value - scale.low) / span : 0.5;
    const y = INSET + (1 - part) * (height - 2 * INSET);
    path += `${pen ? 'L' : 'M'}${(i * step).toFixed(1)} ${y.toFixed(1)}`;
    pen = true;
  });
  return path;
}

/** The scale that holds both. */
export const scaleOfBoth = (a: Scale, b: Scale): Scale => ({
  low: Math.min(a.low, b.low),
  high: Math.max(a.high, b.high),
});
