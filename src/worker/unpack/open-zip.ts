import { PassThrough, type Readable } from 'node:stream';
import yauzl from 'yauzl';
import { getObject } from '../../server/storage/get-object.ts';
import { BadArchive } from './bad-archive.ts';

/** More entries than this in one archive is not a capture. */
const MOST_ENTRIES = 1000;

/** Reads pieces of the archive from the store: the directory at its end first, then the one file. */
class StoreReader extends yauzl.RandomAccessReader {
  private readonly key: string;

  constructor(key: string) {
    super();
    this.key = key;
  }

  override _readStreamForRange(from: number, to: number): Readable {
    const piece = new PassThrough();
    getObject(this.key, { from, to }).then(
      ({ body }) => {
        body.on('error', (error) => piece.destroy(error));
        body.pipe(piece);
      },
      (error: Error) => piece.destroy(error),
    );
    return piece;
  }
}

/**
 * The one file that lies in a zip archive. Folders and what systems add on their own do not count. Names are never used as
 * paths, only to tell which entry is meant.
 */
export async function openZip(key: string, bytes: number): Promise<Readable> {
  const zip = await yauzl
    .fromRandomAccessReaderPromise(new StoreReader(key), bytes, { lazyEntries: true, autoClose: false })
    .catch((error: unknown) => {
      if (isOfArchive(error)) throw damaged(error);
      throw error;
    });
  if (zip.entryCount > MOST_ENTRIES) throw several();
  const files: yauzl.Entry[] = [];
  try {
    for await (const entry of zip.eachEntry()) {
      if (!entry.fileName.endsWith('/') && !/(^|\/)(__MACOSX\/|\.)/.test(entry.fileName)) files.push(entry);
    }
  } catch (error) {
    throw damaged(error);
  }
  const tables = files.filter((entry) => /\.(csv|tsv|txt|dat)$/i.test(entry.fileName));
  const [file, ...more] = tables.length > 0 ? tables : files;
  if (file === undefined) {
    throw new BadArchive('The zip archive holds no file.', 'Put the CSV of one capture into it.');
  }
  if (more.length > 0) throw several();
  if (file.isEncrypted()) {
    throw new BadArchive(
      'The zip archive is protected with a password.',
      'Unpack it on your side and upload the CSV itself.',
    );
  }
  return zip.openReadStreamPromise(file);
}

const several = () =>
  new BadArchive(
    'The zip archive holds several files, and each capture is one file.',
    'Upload the CSV files one by one, or a zip of each.',
  );

const damaged = (cause: unknown) =>
  new BadArchive(
    'The zip archive is damaged or not complete.',
    'Make it anew, or upload the CSV itself.',
    cause,
  );

/** The package's own complaints are plain errors without a code; those of the network and the store have one. */
function isOfArchive(error: unknown): boolean {
  return error instanceof Error && error.constructor === Error && !('code' in error);
}
