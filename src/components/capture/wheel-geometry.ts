import type { WheelJson } from '../../contract/areas/captures.ts';
import { lastAtOrBefore } from '../plot/degrees.ts';
import type { PlotWheel } from '../plot/types.ts';

type Wheel = Readonly<Omit<NonNullable<WheelJson>, 'marksS' | 'teethS' | 'teethDeg'>> & PlotWheel;

export interface WheelTooth {
  /** Tooth 1 is the reference mark. */
  readonly tooth: number;
  /** Mean angle after the reference mark, degrees. */
  readonly angleDeg: number;
  /** Swing over the mean swing; null for three-wire sensors, which show no height. */
  readonly height: number | null;
  /** How much later than its place on an even wheel, degrees; null where places are not even. */
  readonly lateDeg: number | null;
}

export function wheelTeeth(wheel: Wheel): WheelTooth[] {
  const heights = wheel.toothHeights;
  const mean =
    heights === null ? null : heights.reduce((sum, height) => sum + height, 0) / Math.max(heights.length, 1);
  const pitch = wheel.places === null ? null : 360 / wheel.places;
  return wheel.toothAnglesDeg.map((angleDeg, place) => {
    const height = heights?.[place];
    return {
      tooth: place + 1,
      angleDeg,
      height: height === undefined || mean === null || mean === 0 ? null : height / mean,
      lateDeg: pitch === null ? null : angleDeg - Math.round(angleDeg / pitch) * pitch,
    };
  });
}

/** Degrees to turn the drawing by, so that the widest gap stands at the top. */
export function turnToGap(teeth: readonly WheelTooth[]): number {
  let widest = 0;
  let centre = 0;
  teeth.forEach(({ angleDeg }, place) => {
    const next = teeth[place + 1]?.angleDeg ?? (teeth[0]?.angleDeg ?? 0) + 360;
    if (next - angleDeg > widest) {
      widest = next - angleDeg;
      centre = (angleDeg + next) / 2;
    }
  });
  return -centre;
}

/** Point on a circle, clockwise from the top. */
export function onCircle(degrees: number, radius: number): [x: number, y: number] {
  const radians = ((degrees - 90) * Math.PI) / 180;
  return [radius * Math.cos(radians), radius * Math.sin(radians)];
}

/** A tooth's outline from the ring outwards. */
export function toothPath(degrees: number, halfWidthDeg: number, inner: number, outer: number): string {
  const point = (deg: number, radius: number) =>
    onCircle(deg, radius)
      .map((value) => value.toFixed(2))
      .join(' ');
  const from = degrees - halfWidthDeg;
  const to = degrees + halfWidthDeg;
  return `M${point(from, inner)}L${point(from, outer)}A${outer} ${outer} 0 0 1 ${point(to, outer)}L${point(to, inner)}`;
}

/** The stretch of the trace round one tooth, in the first complete turn that holds it; null when it is not there. */
export function stretchOfTooth(wheel: Wheel, tooth: number): { from: number; to: number } | null {
  const turn = wheel.marksS.length > 2 ? 1 : 0;
  const mark = wheel.marksS[turn];
  if (mark === undefined) return null;
  const index = lastAtOrBefore(wheel.teethS, mark + 1e-9) + tooth - 1;
  const at = wheel.teethS[index];
  if (at === undefined) return null;
  const before = wheel.teethS[index - 3] ?? at - 0.01;
  const after = wheel.teethS[index + 3] ?? at + 0.01;
  return { from: before, to: after };
}
