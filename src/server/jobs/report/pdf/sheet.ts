import PDFDocument from 'pdfkit';
import { PALETTES } from '../../../captures/picture/palette.ts';
import { reportFonts } from './fonts.ts';

export type Doc = InstanceType<typeof PDFDocument>;
export type Structure = ReturnType<Doc['struct']>;

export const COLOURS = PALETTES.paper;
export const MARGIN = 48;
const A4 = { width: 595.28, height: 841.89 };
export const CONTENT_WIDTH = A4.width - 2 * MARGIN;
/** Room for the line at the foot of each page. */
const FOOT = 42;
export const BOTTOM = A4.height - MARGIN - FOOT;

export interface SheetInfo {
  readonly title: string;
  readonly author: string;
  /** The only date in the file. */
  readonly at: Date;
}

/** A tagged document with our letters, a language and a title; equal content gives equal bytes. */
export async function newSheet({ title, author, at }: SheetInfo): Promise<Doc> {
  const doc = new PDFDocument({
    size: 'A4',
    margins: { top: MARGIN, left: MARGIN, right: MARGIN, bottom: MARGIN + FOOT },
    tagged: true,
    pdfVersion: '1.7',
    lang: 'en-GB',
    displayTitle: true,
    bufferPages: true,
    info: { Title: title, Author: author, CreationDate: at, ModDate: at },
  });
  const fonts = await reportFonts();
  doc.registerFont('regular', fonts.regular);
  doc.registerFont('strong', fonts.strong);
  doc.font('regular').fontSize(10).fillColor(COLOURS.ink);
  return doc;
}

/** Lines and boxes that mean nothing by themselves: read aloud they would only disturb. */
export function decoration(doc: Doc, draw: () => void): void {
  doc.markContent('Artifact', { type: 'Layout' });
  draw();
  doc.endMarkedContent();
}

/** A new page unless so much height is left. */
export function room(doc: Doc, height: number): void {
  if (doc.y + height > BOTTOM && doc.y > MARGIN + 1) doc.addPage();
}

/** What a structure element says beside its kind: which way a header cell heads, where a figure lies. */
export function setAttributes(element: Structure, attributes: Readonly<Record<string, unknown>>): void {
  // The package documents no way to set them, and its types leave the element's dictionary out.
  const { dictionary } = element as Structure & { dictionary: { data: Record<string, unknown> } };
  dictionary.data.A = attributes;
}
