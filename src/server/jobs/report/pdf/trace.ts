import type { TraceFigure } from '../trace-figure.ts';
import { COLOURS, CONTENT_WIDTH, type Doc, MARGIN, room, type Structure, setAttributes } from './sheet.ts';
import { drawText } from './text.ts';

/** A trace as vector paths with its words beside it for those who cannot see it. */
export function drawTrace(doc: Doc, parent: Structure, figure: TraceFigure): void {
  const scale = CONTENT_WIDTH / figure.width;
  const height = figure.height * scale;
  room(doc, height + 30);
  const top = doc.y;
  const element = doc.struct('Figure', { alt: figure.alt }, () => {
    doc.save().translate(MARGIN, top).scale(scale);
    draw(doc, figure);
    doc.restore();
  });
  const bottom = doc.page.height - top - height;
  setAttributes(element, {
    O: 'Layout',
    Placement: 'Block',
    BBox: [MARGIN, bottom, MARGIN + CONTENT_WIDTH, bottom + height],
  });
  parent.add(element);
  element.end();
  doc.x = MARGIN;
  doc.y = top + height + 4;
  drawText(doc, parent, figure.caption, { type: 'P', size: 8, colour: COLOURS.soft });
}

function draw(doc: Doc, { width, height, left, lanes, times, marks }: TraceFigure): void {
  const label = (text: string, x: number, y: number, across: number, align: 'left' | 'right' | 'center') =>
    doc.text(text, x, y, { width: across, align, lineBreak: false });
  doc.fontSize(7);
  for (const lane of lanes) {
    doc
      .rect(left, lane.top, width - left, lane.height)
      .lineWidth(0.5)
      .strokeColor(COLOURS.rule)
      .stroke();
    doc.font('regular').fillColor(COLOURS.soft);
    for (const { at, text } of lane.ticks) label(text, 0, at - 4, left - 6, 'right');
    doc.font('strong').fillColor(COLOURS.ink);
    label(lane.name.slice(0, 80), left + 4, lane.top + 3, width - left - 8, 'left');
    if (lane.path === '') continue;
    if (lane.dash.length > 0) doc.dash(lane.dash[0]!, { space: lane.dash[1] ?? lane.dash[0]! });
    doc.path(lane.path).lineWidth(0.7).strokeColor(lane.colour).stroke().undash();
  }
  doc.font('regular').fillColor(COLOURS.soft);
  for (const { at, text } of times) label(text, at - 30, height - 13, 60, 'center');
  for (const { at, end, number } of marks) {
    doc.dash(4, { space: 3 }).lineWidth(0.8).strokeColor(COLOURS.accent);
    for (const x of end === null ? [at] : [at, end])
      doc
        .moveTo(x, 12)
        .lineTo(x, height - 16)
        .stroke();
    doc.undash().font('strong').fillColor(COLOURS.accent);
    label(String(number), at - 10, 2, 20, 'center');
  }
  doc.font('regular').fontSize(10).fillColor(COLOURS.ink);
}
