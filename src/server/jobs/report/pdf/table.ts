import type { TableBlock } from '../blocks.ts';
import {
  COLOURS,
  CONTENT_WIDTH,
  type Doc,
  decoration,
  MARGIN,
  room,
  type Structure,
  setAttributes,
} from './sheet.ts';

const PAD = 8;
const SIZE = 9;

interface Cell {
  readonly text: string;
  readonly x: number;
  readonly width: number;
  readonly number: boolean;
  readonly type: 'TH' | 'TD';
  readonly scope?: 'Column' | 'Row';
}

/** A table with header cells for columns and rows, wrapped cells, a line under each row. */
export function drawTable(doc: Doc, parent: Structure, table: TableBlock): void {
  const element = doc.struct('Table');
  parent.add(element);
  let x = MARGIN;
  const columns = table.columns.map((column) => {
    const width = column.share * CONTENT_WIDTH;
    const at = { x, width: width - PAD, number: column.number === true };
    x += width;
    return at;
  });
  const cells = (texts: readonly string[], head: boolean): Cell[] =>
    columns.map((column, place) => ({
      ...column,
      text: texts[place] ?? '',
      type: head || place === 0 ? 'TH' : 'TD',
      ...(head ? { scope: 'Column' as const } : place === 0 ? { scope: 'Row' as const } : {}),
    }));
  drawRow(
    doc,
    element,
    cells(
      table.columns.map(({ title }) => title),
      true,
    ),
    COLOURS.soft,
  );
  for (const row of table.rows) drawRow(doc, element, cells(row, false), COLOURS.ink);
  element.end();
  doc.x = MARGIN;
  doc.y += 6;
}

export function drawRow(doc: Doc, table: Structure, cells: readonly Cell[], colour: string): void {
  doc.font('regular').fontSize(SIZE);
  const height = Math.max(...cells.map(({ text, width }) => doc.heightOfString(text || ' ', { width }))) + 7;
  room(doc, height);
  const top = doc.y;
  const row = doc.struct('TR');
  table.add(row);
  for (const { text, x, width, number, type, scope } of cells) {
    const cell = doc.struct(type, {}, () => {
      doc.fillColor(colour).text(text, x, top + 3, { width, align: number ? 'right' : 'left' });
    });
    if (scope !== undefined) setAttributes(cell, { O: 'Table', Scope: scope });
    row.add(cell);
    cell.end();
  }
  row.end();
  decoration(doc, () =>
    doc
      .moveTo(MARGIN, top + height)
      .lineTo(MARGIN + CONTENT_WIDTH, top + height)
      .lineWidth(0.5)
      .strokeColor(COLOURS.rule)
      .stroke(),
  );
  doc.x = MARGIN;
  doc.y = top + height;
}
