/** What a picture's first bytes say it is; the name and the announced media type are not believed. */
export type PictureFormat = 'jpeg' | 'png' | 'webp';

const PNG = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a];

/** @returns null for everything else: SVG, PDF, HEIC, GIF, text, nothing. */
export function pictureFormat(bytes: Uint8Array): PictureFormat | null {
  if (bytes[0] === 0xff && bytes[1] === 0xd8 && bytes[2] === 0xff) return 'jpeg';
  if (PNG.every((byte, place) => bytes[place] === byte)) return 'png';
  const text = (from: number, to: number) => String.fromCharCode(...bytes.subarray(from, to));
  if (text(0, 4) === 'RIFF' && text(8, 12) === 'WEBP') return 'webp';
  return null;
}
