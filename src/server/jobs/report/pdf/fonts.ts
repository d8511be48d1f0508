import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';

const packages = createRequire(import.meta.url);

const FILES = {
  regular: '400Regular/Archivo_400Regular.ttf',
  strong: '600SemiBold/Archivo_600SemiBold.ttf',
} as const;

let read: Promise<Record<keyof typeof FILES, Buffer>> | undefined;

/** The report's letters, embedded in every file. Read once. */
export function reportFonts(): Promise<Record<keyof typeof FILES, Buffer>> {
  const load = (file: string) => readFile(packages.resolve(`@expo-google-fonts/archivo/${file}`));
  read ??= Promise.all([load(FILES.regular), load(FILES.strong)]).then(([regular, strong]) => ({
    regular,
    strong,
  }));
  return read;
}
