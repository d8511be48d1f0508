import type { RejectedRow } from './types.ts';

export const MOST_REPORTED = 100;

/** The rows that could not be read as they stood: all are counted, the first hundred are told. */
export class Rejections {
  readonly first: RejectedRow[] = [];
  count = 0;

  add(line: number, found: string, expected: string): void {
    this.count++;
    if (this.first.length < MOST_REPORTED) this.first.push({ line, found, expected });
  }
}

/** A cell's text as it is quoted in a sentence. */
export const quoted = (text: string): string => `“${text.length > 60 ? `${text.slice(0, 59)}…` : text}”`;
