import { unguard } from './cells.ts';
import { parseUnit, type Unit } from './units.ts';

export interface ColumnName {
  readonly name: string;
  readonly unit: Unit | null;
}

/** Where exports put a unit beside a name: "U (V)", "U [V]", "U / V", "U, V", "U in V", "U_V". */
const FORMS: readonly RegExp[] = [
  /^(.*?)\s*[([{<]\s*([^()[\]{}<>]+?)\s*[)\]}>]\s*$/,
  /^(.+?)\s*\/\s*([^\s/]+)$/,
  /^(.+?)\s*,\s*([^\s,]+)$/,
  /^(.+?)\s+in\s+(\S+)$/i,
  /^(.+?)_([a-zA-Zµμ°%Ω]{1,5})$/,
];

/** Splits a heading into name and unit. What stands in brackets and is no unit stays part of the name. */
export function splitName(heading: string): ColumnName {
  // A comment sign before the line of names is no part of the first.
  const text = unguard(heading.trim().replace(/^[#%]+\s*(?=[A-Za-z])/, ''));
  for (const form of FORMS) {
    const match = form.exec(text);
    const unit = match === null ? null : parseUnit(match[2]!);
    if (match !== null && unit !== null) return { name: match[1]!.trim() || match[2]!.trim(), unit };
  }
  return { name: text, unit: parseUnit(text) };
}

const TIME =
  /^(time|times|time ?stamp|elapsed|elapsed time|rel(ative)?\.? time|time axis|x|x[- ]?axis|x[- ]?value|t|zeit|temps|tiempo|tempo|tijd|tid|czas|aika|время)\b/i;
const COUNTER =
  /^(#|no\.?|nr\.?|index|idx|samples?|sample ?(no\.?|nr\.?|number|index|#)|points?|row|record|num|number|count|messpunkt|lfd\.? ?nr\.?)$/i;

/** True for headings that name a time axis. */
export const isTimeName = (name: string): boolean => TIME.test(name);

/** True for headings that only count the rows. */
export const isCounterName = (name: string): boolean => COUNTER.test(name);
