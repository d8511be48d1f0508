import { BadArchive } from './bad-archive.ts';

/** Traces written as text shrink ten to fifty times; above this an archive is built to swell. */
const MOST_RATIO = 200;
/** Small files may have any ratio. */
const FREE_BYTES = 16 * 1024 * 1024;

/** Passes unpacked bytes on and stops when they are more than the limit, or far more than what was packed. */
export async function* limited(
  source: AsyncIterable<Uint8Array>,
  packedBytes: number,
  limitBytes: number,
): AsyncGenerator<Uint8Array> {
  let bytes = 0;
  for await (const chunk of source) {
    bytes += chunk.length;
    if (bytes > limitBytes || (bytes > FREE_BYTES && bytes > packedBytes * MOST_RATIO)) {
      throw new BadArchive(
        'The archive unpacks to far more than a capture holds, so unpacking was stopped.',
        'Unpack it on your side and upload the CSV itself.',
      );
    }
    yield chunk;
  }
}
