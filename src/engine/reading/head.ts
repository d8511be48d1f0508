import { joined } from './bytes.ts';
import { detectEncoding } from './encoding.ts';
import type { Encoding, ReadingHints } from './types.ts';
import { Utf16ToUtf8 } from './utf16.ts';

/** Sizes at which the first bytes are looked at: the next only when the one before shows too little. */
export const HEAD_SIZES = [1 << 16, 1 << 18, 1 << 20] as const;

/** The first bytes of a file in an encoding with one byte for each ASCII character, and how the rest gets there. */
export interface Head {
  readonly encoding: Encoding;
  readonly bytes: Uint8Array;
  readonly convert: (chunk: Uint8Array) => Uint8Array;
  readonly end: () => Uint8Array;
}

export function openHead(raw: Uint8Array, hints: ReadingHints): Head {
  const { encoding, markBytes } = detectEncoding(raw, hints.encoding);
  const bytes = raw.subarray(markBytes);
  if (encoding === 'utf-8' || encoding === 'windows-1252') {
    return { encoding, bytes, convert: (chunk) => chunk, end: () => new Uint8Array(0) };
  }
  const stream = new Utf16ToUtf8(encoding === 'utf-16le');
  return {
    encoding,
    bytes: stream.push(bytes),
    convert: (chunk) => stream.push(chunk),
    end: () => stream.end(),
  };
}

/**
 * Gathers the first `size` bytes exactly, so that what is found out does not depend on how the source cuts its
 * chunks. `rest` is what came beyond them.
 */
export class HeadBytes {
  private parts: Uint8Array[] = [];
  length = 0;

  add(chunk: Uint8Array): void {
    // The source may use its buffer again.
    this.parts.push(chunk.slice());
    this.length += chunk.length;
  }

  cut(size: number): { readonly head: Uint8Array; readonly rest: Uint8Array } {
    let all: Uint8Array = new Uint8Array(0);
    if (this.parts.length > 1) {
      all = new Uint8Array(this.length);
      let at = 0;
      for (const part of this.parts) {
        all.set(part, at);
        at += part.length;
      }
    } else all = joined(all, this.parts[0] ?? new Uint8Array(0));
    this.parts = [all];
    return { head: all.subarray(0, size), rest: all.subarray(size) };
  }
}
