import type { Encoding } from './types.ts';

export interface FoundEncoding {
  readonly encoding: Encoding;
  /** Bytes of the byte-order mark to leave out. */
  readonly markBytes: number;
}

/**
 * The encoding of a file from its first bytes: byte-order mark, else the zero bytes that UTF-16 puts beside every
 * ASCII character, else whether the bytes are well-formed UTF-8; what is not is read as Windows-1252.
 */
export function detectEncoding(head: Uint8Array, wanted?: Encoding): FoundEncoding {
  const [a, b, c] = head;
  const mark: FoundEncoding | null =
    a === 0xef && b === 0xbb && c === 0xbf
      ? { encoding: 'utf-8', markBytes: 3 }
      : a === 0xff && b === 0xfe
        ? { encoding: 'utf-16le', markBytes: 2 }
        : a === 0xfe && b === 0xff
          ? { encoding: 'utf-16be', markBytes: 2 }
          : null;
  if (wanted !== undefined) {
    return { encoding: wanted, markBytes: mark?.encoding === wanted ? mark.markBytes : 0 };
  }
  return mark ?? { encoding: zeroPattern(head) ?? (isUtf8(head) ? 'utf-8' : 'windows-1252'), markBytes: 0 };
}

/** UTF-16 without a mark: at least four in ten of one half of the bytes are zero and next to none of the other half. */
function zeroPattern(head: Uint8Array): Encoding | null {
  const pairs = Math.min(head.length, 4096) >> 1;
  if (pairs < 2) return null;
  let even = 0;
  let odd = 0;
  for (let i = 0; i < pairs; i++) {
    if (head[2 * i] === 0) even++;
    if (head[2 * i + 1] === 0) odd++;
  }
  if (odd > 0.4 * pairs && even <= 0.01 * pairs) return 'utf-16le';
  if (even > 0.4 * pairs && odd <= 0.01 * pairs) return 'utf-16be';
  return null;
}

/** Well-formed UTF-8 (RFC 3629, table of section 4); a sequence cut off by the end is allowed. */
export function isUtf8(bytes: Uint8Array): boolean {
  let i = 0;
  while (i < bytes.length) {
    const lead = bytes[i++]!;
    if (lead < 0x80) continue;
    const more =
      lead >= 0xc2 && lead < 0xe0 ? 1 : lead >= 0xe0 && lead < 0xf0 ? 2 : lead >= 0xf0 && lead < 0xf5 ? 3 : 0;
    if (more === 0) return false;
    for (let k = 0; k < more; k++) {
      if (i >= bytes.length) return true;
      const next = bytes[i++]!;
      const low = k === 0 && lead === 0xe0 ? 0xa0 : k === 0 && lead === 0xf0 ? 0x90 : 0x80;
      const high = k === 0 && lead === 0xed ? 0x9f : k === 0 && lead === 0xf4 ? 0x8f : 0xbf;
      if (next < low || next > high) return false;
    }
  }
  return true;
}
