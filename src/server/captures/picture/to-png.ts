import { renderAsync } from '@resvg/resvg-js';
import { fontFiles } from './fonts.ts';

/** An SVG of ours as PNG, at twice its size so that it prints sharply. No font, file or address of the machine is used. */
export async function toPng(svg: string, background: string): Promise<Buffer> {
  const image = await renderAsync(svg, {
    background,
    fitTo: { mode: 'zoom', value: 2 },
    font: { loadSystemFonts: false, fontFiles: fontFiles(), defaultFontFamily: 'Archivo' },
  });
  return image.asPng();
}
