import { align } from './align.ts';
import { allowances } from './allowances.ts';
import { camShiftOf } from './cam-shift.ts';
import { overlayOf } from './overlay.ts';
import { rowsOf } from './rows.ts';
import { saysOf } from './says.ts';
import { shapeOf } from './shape.ts';
import type { Alignment, ByHand, ComparisonFindings, Row, Side } from './types.ts';
import { wordsOf } from './words.ts';

export interface CompareOptions {
  /** The reference moved by a person on the overlay's axis; it touches overlay and shape, not the table. */
  readonly byHand?: ByHand | null;
  /** Teeth of the crank's belt or chain sprocket, when somebody counted them. */
  readonly sprocketTeeth?: number | null;
  /** Rows of an earlier run, which stay as they were. */
  readonly rows?: readonly Row[];
}

/**
 * Compares a signal with one reference, or with several of one engine, circuit and condition: three or more make a band for
 * the table and the overlay. The alignment is the one with the first reference.
 * @throws RangeError without a reference.
 */
export function compare(
  here: Side,
  references: readonly Side[],
  options: CompareOptions = {},
): ComparisonFindings {
  const first = references[0];
  if (!first) throw new RangeError('compare() needs at least one reference');
  const { byHand = null, sprocketTeeth = null } = options;
  const found = align(here, first);
  const alignment: Alignment = { ...found, notes: allowances(here, first, found), byHand };
  const overlay = overlayOf(here, references, found, byHand);
  const rows =
    options.rows ??
    rowsOf(
      here.measured,
      references.map((reference) => reference.measured),
    );
  const camShift = camShiftOf(rows, sprocketTeeth);
  return {
    alignment,
    overlay,
    rows,
    camShift,
    shape: shapeOf(found.by === 'none' ? null : overlay),
    says: saysOf(here.circuit, alignment, rows, camShift),
    text: wordsOf(here, alignment, rows, references.length, camShift),
  };
}
