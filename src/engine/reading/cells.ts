import type { Delimiter } from './types.ts';

/**
 * The cells of one line, trimmed, quotes taken off ("" inside quotes is one quote). A quote opens only at the start
 * of a cell. With spaces as delimiter a run of them counts once and those at the ends do not count.
 */
export function splitCells(line: string, delimiter: Delimiter): string[] {
  const text = delimiter === ' ' ? line.trim() : line;
  const cells: string[] = [];
  let i = 0;
  for (;;) {
    while (text[i] === ' ' && (delimiter !== ' ' || cells.length > 0)) i++;
    let cell = '';
    if (text[i] === '"') {
      i++;
      while (i < text.length && (text[i] !== '"' || text[i + 1] === '"')) {
        if (text[i] === '"') i++;
        cell += text[i++];
      }
      i++;
    }
    const end = text.indexOf(delimiter, i);
    cell += text.slice(i, end < 0 ? text.length : end);
    cells.push(cell.trim());
    if (end < 0) return cells;
    i = end + 1;
  }
}

/** Takes off the apostrophe that an export puts before = + - @ so that a spreadsheet does not run the cell. */
export function unguard(text: string): string {
  return /^'[=+\-@]/.test(text) ? text.slice(1) : text;
}
