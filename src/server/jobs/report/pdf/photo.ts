import sharp from 'sharp';
import { getBytes } from '../../../storage/get-bytes.ts';
import { photoKey } from '../../../storage/keys.ts';
import type { PhotoBlock } from '../blocks.ts';
import { COLOURS, CONTENT_WIDTH, type Doc, MARGIN, room, type Structure, setAttributes } from './sheet.ts';
import { drawText } from './text.ts';

const HIGHEST = 220;
const DOTS = 1_200;

/** The picture small enough for paper, as the one kind that every PDF takes. */
export async function photoBytes(id: string): Promise<Buffer> {
  return sharp(await getBytes(photoKey(id)))
    .resize(DOTS, DOTS, { fit: 'inside', withoutEnlargement: true })
    .flatten({ background: '#ffffff' })
    .jpeg({ quality: 80 })
    .toBuffer();
}

export function drawPhoto(doc: Doc, parent: Structure, photo: PhotoBlock, bytes: Buffer): void {
  const scale = Math.min(CONTENT_WIDTH / photo.width, HIGHEST / photo.height);
  const [width, height] = [photo.width * scale, photo.height * scale];
  const caption = photo.caption || 'Photo without a caption';
  room(doc, height + 24);
  const top = doc.y;
  const element = doc.struct('Figure', { alt: caption }, () => {
    doc.image(bytes, MARGIN, top, { width, height });
  });
  const bottom = doc.page.height - top - height;
  setAttributes(element, {
    O: 'Layout',
    Placement: 'Block',
    BBox: [MARGIN, bottom, MARGIN + width, bottom + height],
  });
  parent.add(element);
  element.end();
  doc.y = top + height + 4;
  drawText(doc, parent, caption, { type: 'P', size: 8, colour: COLOURS.soft });
}
