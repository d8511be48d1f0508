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

/** Lines among which headings with a line end inside their quotes are looked for. */
const HEADING_LINES = 60;

/**
 * Joins headings that were broken inside quotes, as "Time<line end>(s)" is: a line with a quote left open, letters in
 * it, and the line within the next three that closes it. Only headings: rows of numbers are never joined.
 */
export function joinHeadings(lines: readonly HeadLine[]): HeadLine[] {
  const joined: HeadLine[] = [];
  const isOpen = (text: string) => text.split('"').length % 2 === 0;
  for (let i = 0; i < lines.length; i++) {
    const line = lines[i]!;
    const near = i < HEADING_LINES && /[A-Za-z]/.test(line.text) && isOpen(line.text);
    const close = near ? lines.slice(i + 1, i + 4).findIndex(({ text }) => isOpen(text)) : -1;
    const parts = lines.slice(i, i + 2 + close);
    if (close < 0 || !parts.every(({ text }) => /[A-Za-z]/.test(text))) joined.push(line);
    else {
      joined.push({ ...line, text: parts.map(({ text }) => text).join(' ') });
      i += close + 1;
    }
  }
  return joined;
}
