import { renderAsync } from '@resvg/resvg-js';
import { fontFiles } from './fonts.ts';

/** More pixels than this would cost more memory than a picture is worth: then it is drawn less finely. */
const MOST_PIXELS = 24_000_000;

/** How much finer than its size in CSS pixels a picture is drawn: twice, so that it prints sharply, or what its size allows. */
export const finenessOf = (width: number, height: number): number =>
  Math.min(2, Math.sqrt(MOST_PIXELS / Math.max(width * height, 1)));

/** An SVG of ours as PNG. No font, file or address of the machine is used. */
export async function toPng(
  { svg, width, height }: { readonly svg: string; readonly width: number; readonly height: number },
  background: string,
): Promise<Buffer> {
  const image = await renderAsync(svg, {
    background,
    fitTo: { mode: 'zoom', value: finenessOf(width, height) },
    font: { loadSystemFonts: false, fontFiles: fontFiles(), defaultFontFamily: 'Archivo' },
  });
  return image.asPng();
}
