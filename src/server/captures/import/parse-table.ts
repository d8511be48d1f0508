export interface TableLine {
  /** As an editor counts them, from 1; of a quoted cell over several lines the first. */
  readonly line: number;
  readonly cells: readonly string[];
}

const DELIMITERS = [',', ';', '\t'] as const;

/** Of comma, semicolon and tab the one that the first line has most of. */
function delimiterOf(text: string): string {
  const head = text.slice(0, Math.max(0, text.search(/[\r\n]|$/)));
  const count = (each: string) => head.split(each).length;
  return DELIMITERS.reduce((best, each) => (count(each) > count(best) ? each : best));
}

/**
 * A table of text after RFC 4180, with comma, semicolon or tab; each record keeps the line it begins in, to be named. Empty lines are left out; a leading apostrophe that guards a
 * cell against spreadsheets goes. A quote that is never closed ends with the text and is told as `open`, its line.
 */
export function parseTable(csv: string): { lines: TableLine[]; open: number | null } {
  const text = csv.replace(/^\uFEFF/, '');
  const delimiter = delimiterOf(text);
  const lines: TableLine[] = [];
  let cells: string[] = [];
  let cell = '';
  let quoted = false;
  let line = 1;
  let began = 1;
  const endCell = () => {
    cells.push(cell.trim().replace(/^'(?=[=+\-@\t\r])/, ''));
    cell = '';
  };
  const endLine = () => {
    endCell();
    if (cells.some((each) => each !== '')) lines.push({ line: began, cells });
    cells = [];
  };
  for (let at = 0; at < text.length; at += 1) {
    const sign = text[at]!;
    if (quoted) {
      if (sign === '"' && text[at + 1] === '"') {
        cell += '"';
        at += 1;
      } else if (sign === '"') quoted = false;
      else cell += sign;
      if (sign === '\n') line += 1;
    } else if (sign === '"' && cell.trim() === '') {
      cell = '';
      quoted = true;
    } else if (sign === delimiter) endCell();
    else if (sign === '\n' || sign === '\r') {
      if (sign === '\r' && text[at + 1] === '\n') at += 1;
      endLine();
      line += 1;
      began = line;
    } else cell += sign;
  }
  const open = quoted ? began : null;
  endLine();
  return { lines, open };
}
