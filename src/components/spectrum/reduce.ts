import type { Spectrum } from '../../engine/signal/spectrum.ts';

/**
 * Steps of the transform between two frequencies as points for `columns` pixels: lowest and highest of each pixel in the order in
 * which they come, so that no line is lost; single steps where they are further apart than pixels.
 */
export function reduceSpectrum(
  { stepHz, amplitude }: Spectrum,
  fromHz: number,
  toHz: number,
  columns: number,
): [hz: number, amplitude: number][] {
  const first = Math.max(Math.floor(fromHz / stepHz) - 1, 0);
  const last = Math.min(Math.ceil(toHz / stepHz) + 1, amplitude.length - 1);
  const points: [number, number][] = [];
  const each = (last - first + 1) / Math.max(columns, 1);
  if (each <= 2) {
    for (let k = first; k <= last; k += 1) points.push([k * stepHz, amplitude[k]!]);
    return points;
  }
  for (let column = 0; column < columns; column += 1) {
    const start = first + Math.floor(column * each);
    const end = Math.min(first + Math.floor((column + 1) * each), last + 1);
    let low = start;
    let high = start;
    for (let k = start; k < end; k += 1) {
      if (amplitude[k]! < amplitude[low]!) low = k;
      if (amplitude[k]! > amplitude[high]!) high = k;
    }
    for (const k of [Math.min(low, high), Math.max(low, high)]) points.push([k * stepHz, amplitude[k]!]);
  }
  return points;
}
