import { CR, LF } from './bytes.ts';
import { decodeText } from './text.ts';
import type { Encoding } from './types.ts';

export interface HeadLine {
  /** Line number in the file, from 1. */
  readonly line: number;
  readonly text: string;
  /** Where the line begins in the head's bytes. */
  readonly from: number;
}

/**
 * The whole lines at the beginning of a file. LF, CR LF and a lone CR all end a line; a last line without an end is
 * given only when the file ends with it.
 */
export function splitLines(
  head: Uint8Array,
  encoding: Encoding,
  isWholeFile: boolean,
  most: number,
): HeadLine[] {
  const lines: HeadLine[] = [];
  let from = 0;
  for (let i = 0; i < head.length && lines.length < most; i++) {
    const byte = head[i];
    if (byte !== LF && byte !== CR) continue;
    lines.push({ line: lines.length + 1, text: decodeText(head, from, i, encoding), from });
    if (byte === CR && head[i + 1] === LF) i++;
    from = i + 1;
  }
  if (isWholeFile && from < head.length && lines.length < most) {
    lines.push({ line: lines.length + 1, text: decodeText(head, from, head.length, encoding), from });
  }
  return lines;
}
