import { createHash } from 'node:crypto';
import { createGunzip } from 'node:zlib';
import { getBytes } from '../../server/storage/get-bytes.ts';
import { getObject } from '../../server/storage/get-object.ts';
import { BadArchive } from './bad-archive.ts';
import { limited } from './limited.ts';
import { openZip } from './open-zip.ts';

export interface OpenedOriginal {
  /** The table's bytes, unpacked where the original is a .gz or a .zip of one file. */
  readonly text: AsyncIterable<Uint8Array>;
  /** Packed: how many bytes `text` will have is not known beforehand. */
  readonly packed: boolean;
  /** SHA-256 of the original; call it when `text` has ended. Null when none was asked for. */
  sha256(): Promise<string | null>;
}

/** Opens an original for reading from its first byte on. What it is, its first bytes say, not its name. */
export async function openOriginal(
  key: string,
  bytes: number,
  options: { readonly needsSha256: boolean; readonly unpackedLimitBytes: number },
): Promise<OpenedOriginal> {
  const head = bytes === 0 ? new Uint8Array(0) : await getBytes(key, { from: 0, to: Math.min(4, bytes) });
  if (head[0] === 0x50 && head[1] === 0x4b && (head[2] === 3 || head[2] === 5)) {
    const text = limited(await openZip(key, bytes), bytes, options.unpackedLimitBytes);
    return { text: told(text), packed: true, sha256: () => hashOf(key, options.needsSha256) };
  }
  const { body } = await getObject(key);
  if (head[0] === 0x1f && head[1] === 0x8b) {
    const unzipped = createGunzip();
    body.on('error', (error) => unzipped.destroy(error));
    const text = limited(body.pipe(unzipped), bytes, options.unpackedLimitBytes);
    return { text: told(text), packed: true, sha256: () => hashOf(key, options.needsSha256) };
  }
  if (!options.needsSha256) return { text: body, packed: false, sha256: async () => null };
  const hash = createHash('sha256');
  // A reader that stops early (a file it cannot read) has not seen every byte.
  let ended = false;
  async function* hashed() {
    for await (const chunk of body as AsyncIterable<Uint8Array>) {
      hash.update(chunk);
      yield chunk;
    }
    ended = true;
  }
  return {
    text: hashed(),
    packed: false,
    sha256: async () => (ended ? hash.digest('hex') : hashOf(key, true)),
  };
}

/** Reads the whole original once more: an archive is not read from end to end while it is unpacked. */
export async function hashOf(key: string, needed: boolean): Promise<string | null> {
  if (!needed) return null;
  const hash = createHash('sha256');
  const { body } = await getObject(key);
  for await (const chunk of body as AsyncIterable<Uint8Array>) hash.update(chunk);
  return hash.digest('hex');
}

/** Says in words what zlib says in codes. */
async function* told(text: AsyncIterable<Uint8Array>): AsyncGenerator<Uint8Array> {
  try {
    yield* text;
  } catch (error) {
    const code = error instanceof Error && 'code' in error ? String(error.code) : '';
    const damagedZip = error instanceof Error && /invalid|crc|size/i.test(error.message) && code === '';
    if (!code.startsWith('Z_') && !damagedZip) throw error;
    throw new BadArchive(
      'The packed file is damaged or not complete.',
      'Pack it anew, or upload the CSV itself.',
      error,
    );
  }
}
