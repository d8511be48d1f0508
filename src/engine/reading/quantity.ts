import { cellKind } from './cellKind.ts';
import type { Decimal } from './types.ts';
import { parseUnit, type Unit } from './units.ts';

/** A cell with its unit inside: "1.5 V", "12,3 mV", "-4e-3s". */
export interface Quantity {
  /** The number as written. */
  readonly number: string;
  readonly unit: Unit;
}

const FORM = /^([+−-]?[\d.,'’\u00a0\u202f\u2009 ]*\d[.,]?(?:[eE][+−-]?\d+)?)\s*([^\d\s.,+−-][^\s]{0,11})$/;

/** Number and unit of one trimmed cell, with `decimal` as the decimal mark; null when it is not exactly that. */
export function quantityOf(text: string, decimal: Decimal): Quantity | null {
  const match = FORM.exec(text);
  if (match === null) return null;
  const number = match[1]!.trim();
  const kind = cellKind(number, decimal);
  const unit = kind === 'number' || kind === 'grouped' ? parseUnit(match[2]!) : null;
  return unit === null || unit.unit === '1' ? null : { number, unit };
}

/**
 * Decimal places from a cell's unit to its column's: "1500 mV" in a column of volts is 3. null for another quantity, or one whose
 * step is no power of ten.
 */
export function placesBetween(cell: Unit, column: Unit): number | null {
  if (cell.unit !== column.unit) return null;
  const places = Math.log10(column.factor / cell.factor);
  return Math.abs(places - Math.round(places)) < 1e-9 ? Math.round(places) : null;
}
