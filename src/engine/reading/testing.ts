import { readTable } from './read.ts';
import type { ReadFailure, ReadingHints, ReadTable } from './types.ts';

/** For tests: bytes of a text, one chunk after another cut at `cuts`, as a source to read from. */
export async function* chunked(bytes: Uint8Array, cuts: readonly number[] = []): AsyncGenerator<Uint8Array> {
  const places = [0, ...cuts.map((cut) => cut % (bytes.length + 1)).sort((a, b) => a - b), bytes.length];
  for (let i = 1; i < places.length; i++) yield bytes.subarray(places[i - 1], places[i]);
}

export const read = (text: string | Uint8Array, hints: ReadingHints = {}, cuts: readonly number[] = []) =>
  readTable(chunked(typeof text === 'string' ? new TextEncoder().encode(text) : text, cuts), { hints });

export async function readGood(text: string | Uint8Array, hints: ReadingHints = {}): Promise<ReadTable> {
  const outcome = await read(text, hints);
  if (!outcome.ok) throw new Error(`${outcome.code}: ${outcome.message}`);
  return outcome;
}

export async function readBad(text: string | Uint8Array, hints: ReadingHints = {}): Promise<ReadFailure> {
  const outcome = await read(text, hints);
  if (outcome.ok) throw new Error(`read ${outcome.reading.rows} rows of what cannot be read`);
  return outcome;
}

/** Times of all rows. */
export function timesOf({ axis }: ReadTable): number[] {
  if (axis.kind === 'uneven') return [...axis.timesS];
  return Array.from({ length: axis.count }, (_, i) => axis.startS + i * axis.stepS);
}

/** UTF-16 bytes of a text. */
export function utf16(text: string, littleEndian: boolean): Uint8Array {
  const bytes = new Uint8Array(2 * text.length);
  for (let i = 0; i < text.length; i++) {
    const unit = text.charCodeAt(i);
    bytes[2 * i + (littleEndian ? 0 : 1)] = unit & 255;
    bytes[2 * i + (littleEndian ? 1 : 0)] = unit >> 8;
  }
  return bytes;
}
