import type { Readable } from 'node:stream';
import { type Entry, type Options, open, type ZipFile } from 'yauzl';

/** A zip file opened for reading its entries in any order, with what its directory says checked. */
export interface ZipReader {
  readonly entries: ReadonlyMap<string, Entry>;
  read(name: string): Promise<Readable>;
  close(): void;
}

const OPTIONS: Options = {
  lazyEntries: true,
  autoClose: false,
  decodeStrings: true,
  validateEntrySizes: true,
};

/** @throws when the file is no zip, has more entries than `limit`, or one name twice. Names that climb out are refused by the package. */
export async function openZip(path: string, limit: number): Promise<ZipReader> {
  const zip = await new Promise<ZipFile>((resolve, reject) =>
    open(path, OPTIONS, (error, opened) => (error ? reject(error) : resolve(opened))),
  );
  try {
    const entries = await readDirectory(zip, limit);
    return {
      entries,
      read: (name) =>
        new Promise((resolve, reject) => {
          const entry = entries.get(name);
          if (entry === undefined) return reject(new Error(`the file has no part ${name}`));
          zip.openReadStream(entry, (error, stream) => (error ? reject(error) : resolve(stream)));
        }),
      close: () => zip.close(),
    };
  } catch (error) {
    zip.close();
    throw error;
  }
}

function readDirectory(zip: ZipFile, limit: number): Promise<Map<string, Entry>> {
  if (zip.entryCount > limit) throw new Error(`the file has more than ${limit} parts`);
  const entries = new Map<string, Entry>();
  return new Promise((resolve, reject) => {
    zip.on('error', reject);
    zip.on('end', () => resolve(entries));
    zip.on('entry', (entry: Entry) => {
      if (entries.has(entry.fileName)) return reject(new Error(`the file has ${entry.fileName} twice`));
      entries.set(entry.fileName, entry);
      zip.readEntry();
    });
    zip.readEntry();
  });
}
