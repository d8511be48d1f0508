import { cellKind } from './cellKind.ts';
import { splitCells } from './cells.ts';
import type { Layout } from './layout.ts';
import { type HeadLine, splitLines } from './lines.ts';
import type { Encoding, PreviewLine } from './types.ts';

const LINES_ABOVE = 12;
const ROWS = 20;
const MOST_CELLS = 64;
const MOST_LETTERS = 120;

/** The lines around the beginning of the table as they came, with what was made of each. */
export function makePreview({ lines, dialect, header }: Layout): PreviewLine[] {
  const first = dialect.firstRow ?? 0;
  const from = Math.max(0, first - LINES_ABOVE);
  return lines.slice(from, first + ROWS).map((line, k) => {
    const cells = splitCells(line.text, dialect.delimiter);
    return shortened(line, cells, roleOf(from + k, cells));
  });

  function roleOf(at: number, cells: readonly string[]): PreviewLine['role'] {
    if (cells.every((cell) => cell === '')) return 'empty';
    if (at === header.namesAt) return 'names';
    if (at === header.unitsAt) return 'units';
    if (dialect.firstRow === null || at < dialect.firstRow) return 'text';
    const isRead =
      cells.length <= dialect.cells && cells.every((cell) => cellKind(cell, dialect.decimal) !== 'text');
    return isRead && cells.length === dialect.cells ? 'numbers' : 'rejected';
  }
}

/** The first lines of a file that could not be understood, each as one cell. */
export function plainPreview(head: Uint8Array, encoding: Encoding): PreviewLine[] {
  return splitLines(head, encoding, true, ROWS).map((line) =>
    shortened(line, [line.text], line.text.trim() === '' ? 'empty' : 'text'),
  );
}

function shortened({ line }: HeadLine, cells: readonly string[], role: PreviewLine['role']): PreviewLine {
  const shown = cells
    .slice(0, MOST_CELLS)
    .map((cell) => (cell.length > MOST_LETTERS ? `${cell.slice(0, MOST_LETTERS - 1)}…` : cell));
  return { line, cells: shown, role };
}
