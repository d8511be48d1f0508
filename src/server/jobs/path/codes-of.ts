import { CODES } from './data/codes.ts';
import type { CheckRecord } from './facts.ts';
import type { Code } from './types.ts';

export interface NotedCode {
  readonly code: string;
  /** Null: not one of this path; kept as typed. */
  readonly known: Code | null;
}

/** A code as scan tools write it: letter, four hexadecimal digits. What is not one stays as it was typed. */
export function tidyCode(typed: string): string {
  const tidy = typed.trim().toUpperCase().replace(/[\s-]/g, '');
  return /^[PBCU][0-3][0-9A-F]{3}$/.test(tidy) ? tidy : typed.trim();
}

/** The codes noted with the job and with any check, each once, in order. */
export function codesOf(records: readonly CheckRecord[], noted: readonly string[]): NotedCode[] {
  const codes = new Set([...noted, ...records.flatMap((record) => record.codes)].map(tidyCode));
  return [...codes].map((code) => ({
    code,
    known: Object.hasOwn(CODES, code) ? (CODES[code] ?? null) : null,
  }));
}
