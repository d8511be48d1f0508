import type { Block, Report } from './blocks.ts';
import { drawList } from './pdf/list.ts';
import { drawPhoto, photoBytes } from './pdf/photo.ts';
import {
  COLOURS,
  CONTENT_WIDTH,
  type Doc,
  decoration,
  MARGIN,
  newSheet,
  room,
  type Structure,
} from './pdf/sheet.ts';
import { drawTable } from './pdf/table.ts';
import { drawText } from './pdf/text.ts';
import { drawTrace } from './pdf/trace.ts';

/** A report as a tagged PDF. Equal reports give equal bytes. */
export async function reportPdf(report: Report): Promise<Buffer> {
  const doc = await newSheet({ title: report.title, author: report.workshop, at: report.asOf });
  const photos = await photosOf(report);
  const chunks: Buffer[] = [];
  doc.on('data', (chunk: Buffer) => chunks.push(chunk));
  const ended = new Promise<void>((resolve, reject) => {
    doc.on('end', resolve);
    doc.on('error', reject);
  });
  const root = doc.struct('Document');
  doc.addStructure(root);
  drawText(doc, root, report.kicker, { type: 'P', size: 9, colour: COLOURS.soft });
  drawText(doc, root, report.title, { type: 'H1', size: 19, strong: true });
  drawText(doc, root, report.workshop, { type: 'P', size: 11, strong: true });
  drawTable(doc, root, {
    kind: 'table',
    columns: [
      { title: 'What', share: 0.2 },
      { title: 'As it was entered', share: 0.8 },
    ],
    rows: report.facts,
  });
  for (const section of report.sections) {
    const [first] = section.blocks;
    // A heading stays on the page of its figure.
    if (first?.kind === 'trace') room(doc, first.figure.height + 70);
    const part = doc.struct('Sect');
    root.add(part);
    drawText(doc, part, section.heading, { type: 'H2', size: 13, strong: true, before: 10 });
    for (const block of section.blocks) drawBlock(doc, part, block, photos);
    part.end();
  }
  root.end();
  drawFeet(doc, report.foot);
  doc.end();
  await ended;
  return Buffer.concat(chunks);
}

async function photosOf(report: Report): Promise<ReadonlyMap<string, Buffer>> {
  const photos = new Map<string, Buffer>();
  for (const { blocks } of report.sections)
    for (const block of blocks) if (block.kind === 'photo') photos.set(block.id, await photoBytes(block.id));
  return photos;
}

function drawBlock(doc: Doc, parent: Structure, block: Block, photos: ReadonlyMap<string, Buffer>): void {
  switch (block.kind) {
    case 'text':
      drawText(doc, parent, block.text, {
        type: 'P',
        ...(block.weight === 'strong' ? { size: 12, strong: true } : {}),
        ...(block.weight === 'soft' ? { size: 9, colour: COLOURS.soft } : {}),
      });
      break;
    case 'list':
      drawList(doc, parent, block.items);
      break;
    case 'table':
      drawTable(doc, parent, block);
      break;
    case 'trace':
      drawTrace(doc, parent, block.figure);
      break;
    case 'photo': {
      const bytes = photos.get(block.id);
      if (bytes !== undefined) drawPhoto(doc, parent, block, bytes);
    }
  }
}

/** What the report is not, and the page's number, at the foot of every page. */
function drawFeet(doc: Doc, foot: string): void {
  const { start, count } = doc.bufferedPageRange();
  for (let page = 0; page < count; page += 1) {
    doc.switchToPage(start + page);
    // Otherwise writing this low would begin another page.
    doc.page.margins.bottom = 0;
    const top = doc.page.height - MARGIN - 24;
    decoration(doc, () => {
      doc
        .moveTo(MARGIN, top)
        .lineTo(MARGIN + CONTENT_WIDTH, top)
        .lineWidth(0.5)
        .strokeColor(COLOURS.line)
        .stroke();
      doc.font('regular').fontSize(7.5).fillColor(COLOURS.soft);
      doc.text(foot, MARGIN, top + 5, { width: CONTENT_WIDTH - 80 });
      doc.text(`${page + 1} of ${count}`, MARGIN + CONTENT_WIDTH - 70, top + 5, {
        width: 70,
        align: 'right',
      });
    });
  }
}
