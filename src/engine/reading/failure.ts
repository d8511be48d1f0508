import type { PreviewLine, ReadFailure } from './types.ts';

/** A file that cannot be read; the upload itself is always kept, and every message may rely on that. */
export function failure(
  code: ReadFailure['code'],
  message: string,
  hint: string,
  preview: readonly PreviewLine[] = [],
  line: number | null = null,
): ReadFailure {
  return { ok: false, code, message, hint, line, preview };
}
