import { align } from './align.ts';
import { overlayOf } from './overlay.ts';
import { rowsOf } from './rows.ts';
import { shapeOf } from './shape.ts';
import type { ComparisonFindings, Side } from './types.ts';
import { wordsOf } from './words.ts';

/**
 * Compares a signal with one reference, or with several of one engine, circuit and condition: three or more make a band for
 * the table. The overlay and the alignment are those with the first reference.
 * @throws RangeError without a reference.
 */
export function compare(here: Side, references: readonly Side[]): ComparisonFindings {
  const first = references[0];
  if (!first) throw new RangeError('compare() needs at least one reference');
  const alignment = align(here, first);
  const overlay = overlayOf(here, first, alignment);
  const rows = rowsOf(
    here.measured,
    references.map((reference) => reference.measured),
  );
  return {
    alignment,
    overlay,
    rows,
    shape: shapeOf(overlay),
    text: wordsOf(here, alignment, rows, references.length),
  };
}
