import type { CheckId } from './data/checks.ts';

interface ParsedRef {
  readonly check: CheckId;
  readonly finding: string;
}

const parsed = new Map<string, ParsedRef>();

/** "check:finding" in its two parts. The data hold a few hundred of them, asked for many times. */
export function parseRef(ref: string): ParsedRef {
  const present = parsed.get(ref);
  if (present !== undefined) return present;
  const [check, finding = ''] = ref.split(':');
  const made = { check: check as CheckId, finding };
  parsed.set(ref, made);
  return made;
}
