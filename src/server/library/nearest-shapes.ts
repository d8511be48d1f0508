import { SHAPE_LENGTH } from '../../engine/comparison/shapes/shape-of.ts';

/** Shapes one after the other, 128 numbers each, and whose they are. */
export interface Shapes {
  readonly ids: readonly string[];
  readonly indices: readonly number[];
  readonly numbers: Float32Array;
}

export interface Near {
  readonly place: number;
  readonly distance: number;
}

/**
 * The `limit` nearest by Euclid's distance, every one of them looked at: exact, no index that could miss one. A sum that
 * passes the last of the best so far is given up after each quarter.
 */
export function nearestShapes(numbers: Float32Array, wanted: Float32Array, limit: number): Near[] {
  const best: { place: number; squares: number }[] = [];
  let worst = Infinity;
  const count = Math.floor(numbers.length / SHAPE_LENGTH);
  const quarter = SHAPE_LENGTH / 4;
  for (let place = 0; place < count; place++) {
    const start = place * SHAPE_LENGTH;
    let squares = 0;
    for (let part = 0; part < SHAPE_LENGTH && squares < worst; part += quarter) {
      let first = 0;
      let second = 0;
      for (let i = part; i < part + quarter; i += 2) {
        const a = numbers[start + i]! - wanted[i]!;
        const b = numbers[start + i + 1]! - wanted[i + 1]!;
        first += a * a;
        second += b * b;
      }
      squares += first + second;
    }
    if (squares >= worst) continue;
    let at = best.length;
    while (at > 0 && best[at - 1]!.squares > squares) at -= 1;
    best.splice(at, 0, { place, squares });
    if (best.length > limit) best.pop();
    if (best.length === limit) worst = best[limit - 1]!.squares;
  }
  return best.map(({ place, squares }) => ({ place, distance: Math.sqrt(squares) }));
}
