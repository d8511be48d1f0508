import { ENOUGH_BLOCKS, FIRST_BLOCK, LEVEL_FACTOR, type PyramidLevel } from '../../engine/signal/pyramid.ts';
import { bytesOf } from './typed-bytes.ts';

/**
 * A signal's pyramid in the store: a header of 64 bytes, then the levels from finest to coarsest, each `blocks` times four
 * float32 (first, extremes in time order, last). Where a level lies follows from the number of samples alone, so a reader
 * asks for the range that it needs and nothing before. The header is for people and tools: magic "GMPY", format 1, levels
 * (uint32 each), number of samples (float64).
 *
 * An uneven axis has a file of the same layout idea for times: per level one float64 a block, the time of its first sample.
 */
export const HEADER_BYTES = 64;
const MAGIC = 0x59504d47;
const FORMAT = 1;

export interface LevelPlace {
  readonly blockSize: number;
  readonly blocks: number;
  /** Byte offset in the signal's pyramid file. */
  readonly offset: number;
  /** Byte offset in the file of times at block bounds. */
  readonly timesOffset: number;
}

/** Where the levels of so many samples lie. No samples, no levels. */
export function pyramidLayout(samples: number): LevelPlace[] {
  const places: LevelPlace[] = [];
  if (samples === 0) return places;
  let blockSize = FIRST_BLOCK;
  let offset = HEADER_BYTES;
  let timesOffset = HEADER_BYTES;
  for (;;) {
    const blocks = Math.ceil(samples / blockSize);
    places.push({ blockSize, blocks, offset, timesOffset });
    if (blocks <= ENOUGH_BLOCKS) return places;
    offset += blocks * 16;
    timesOffset += blocks * 8;
    blockSize *= LEVEL_FACTOR;
  }
}

/** The file of a pyramid. Throws when the levels are not those that the layout promises to readers. */
export function encodePyramid(samples: number, levels: readonly PyramidLevel[]): Uint8Array {
  const places = pyramidLayout(samples);
  const matches =
    places.length === levels.length &&
    places.every(
      (place, k) => place.blocks === levels[k]?.blocks && place.blockSize === levels[k]?.blockSize,
    );
  if (!matches) throw new Error('The levels of this pyramid are not the ones that its layout has.');
  const last = places.at(-1);
  const bytes = new Uint8Array(last === undefined ? HEADER_BYTES : last.offset + last.blocks * 16);
  writeHeader(bytes, places.length, samples);
  levels.forEach((level, k) => {
    bytes.set(bytesOf(level.values), places[k]!.offset);
  });
  return bytes;
}

/** The file of times at block bounds. */
export function encodeTimesPyramid(timesS: Float64Array): Uint8Array {
  const places = pyramidLayout(timesS.length);
  const last = places.at(-1);
  const bytes = new Uint8Array(last === undefined ? HEADER_BYTES : last.timesOffset + last.blocks * 8);
  writeHeader(bytes, places.length, timesS.length);
  for (const place of places) {
    const starts = new Float64Array(place.blocks);
    for (let block = 0; block < place.blocks; block += 1) starts[block] = timesS[block * place.blockSize]!;
    bytes.set(bytesOf(starts), place.timesOffset);
  }
  return bytes;
}

function writeHeader(bytes: Uint8Array, levels: number, samples: number): void {
  const view = new DataView(bytes.buffer);
  view.setUint32(0, MAGIC, true);
  view.setUint32(4, FORMAT, true);
  view.setUint32(8, levels, true);
  view.setFloat64(16, samples, true);
}
