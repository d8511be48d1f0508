import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';

const packages = createRequire(import.meta.url);

/** Archivo as TrueType for PNG; the picture's letters come from these files alone, whatever the machine has. */
export const fontFiles = (): string[] =>
  ['400Regular/Archivo_400Regular.ttf', '600SemiBold/Archivo_600SemiBold.ttf'].map((file) =>
    packages.resolve(`@expo-google-fonts/archivo/${file}`),
  );

let face: Promise<string> | undefined;

/** Archivo inside the SVG, so that it looks the same where it is not installed. Read once. */
export function fontFace(): Promise<string> {
  face ??= readFile(
    packages.resolve('@fontsource-variable/archivo/files/archivo-latin-wght-normal.woff2'),
    'base64',
  ).then(
    (data) =>
      `@font-face{font-family:Archivo;font-weight:100 900;src:url(data:font/woff2;base64,${data}) format("woff2")}`,
  );
  return face;
}
