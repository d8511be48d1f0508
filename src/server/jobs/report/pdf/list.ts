import { COLOURS, CONTENT_WIDTH, type Doc, MARGIN, room, type Structure } from './sheet.ts';

const INDENT = 12;

/** A list, each item with its label and body. */
export function drawList(doc: Doc, parent: Structure, items: readonly string[]): void {
  const list = doc.struct('L');
  parent.add(list);
  doc.font('regular').fontSize(9).fillColor(COLOURS.ink);
  for (const text of items) {
    room(doc, Math.min(120, doc.heightOfString(text, { width: CONTENT_WIDTH - INDENT })));
    const item = doc.struct('LI');
    list.add(item);
    const top = doc.y;
    const label = doc.struct('Lbl', {}, () => doc.text('–', MARGIN, top, { width: INDENT }));
    const body = doc.struct('LBody', {}, () =>
      doc.text(text, MARGIN + INDENT, top, { width: CONTENT_WIDTH - INDENT }),
    );
    for (const part of [label, body]) {
      item.add(part);
      part.end();
    }
    item.end();
    doc.y += 2;
  }
  list.end();
  doc.x = MARGIN;
  doc.y += 4;
}
