import { COLOURS, CONTENT_WIDTH, type Doc, MARGIN, room, type Structure } from './sheet.ts';

interface TextStyle {
  readonly type: 'H1' | 'H2' | 'P';
  readonly size?: number;
  readonly colour?: string;
  readonly strong?: boolean;
  /** Free space before it. */
  readonly before?: number;
}

/** A paragraph or heading over the whole width. */
export function drawText(doc: Doc, parent: Structure, text: string, style: TextStyle): void {
  const { type, size = 10, colour = COLOURS.ink, strong = false, before = 0 } = style;
  if (text === '') return;
  if (doc.y > MARGIN + 1) doc.y += before;
  // A heading stays with what follows.
  room(doc, size * (type === 'P' ? 1.4 : 5));
  const element = doc.struct(type, {}, () => {
    doc
      .font(strong ? 'strong' : 'regular')
      .fontSize(size)
      .fillColor(colour)
      .text(text, MARGIN, doc.y, { width: CONTENT_WIDTH });
  });
  parent.add(element);
  element.end();
  doc.y += 4;
}
