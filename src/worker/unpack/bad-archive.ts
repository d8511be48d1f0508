import type { ReadFailure } from '../../engine/reading/types.ts';

/** An archive that cannot be unpacked, or will not be: carries the sentence for the person. */
export class BadArchive extends Error {
  override readonly name = 'BadArchive';
  readonly hint: string;

  constructor(message: string, hint: string, cause?: unknown) {
    super(message, { cause });
    this.hint = hint;
  }

  toFailure(): ReadFailure {
    const { message, hint } = this;
    return { ok: false, code: 'bad_archive', message, hint, line: null, preview: [] };
  }
}
