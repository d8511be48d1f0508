import type { Outcome } from './outcomes.ts';
import { COMPLAINTS, type Complaint } from './types.ts';

const WORDS: readonly (readonly [Complaint, RegExp])[] = [
  ['stall', /\b(stalls?|stalled|stalling|dies|died|cuts? out|cutting out|goes off|went off)\b/i],
  [
    'slow-crank',
    /\b(slow(ly)? (to )?(crank|turn)\w*|(cranks?|turns?) (over )?(very |too )?slow\w*|does not (crank|turn)|won'?t crank|only clicks?|clicks? only)\b/i,
  ],
  ['misfire', /\b(misfires?|misfiring|rough|jerks?|shakes?|on three cylinders)\b/i],
];

/** What the engine does: as recorded, else guessed from the customer's words, else the main complaint. */
export function complaintOf(
  recorded: Outcome | undefined,
  text: string,
): { complaint: Complaint; guessed: boolean } {
  const said = COMPLAINTS.find((one) => recorded?.findings.length === 1 && recorded.findings[0] === one);
  if (said !== undefined) return { complaint: said, guessed: false };
  // "Starts, then dies" is stalling; "does not start" names the main complaint before any other word.
  const noStart = /\b(no[ -]start|(does|did|will) not start|won'?t start|not start)\b/i.test(text);
  const found = noStart ? undefined : WORDS.find(([, pattern]) => pattern.test(text));
  return { complaint: found?.[0] ?? 'cranks-no-start', guessed: true };
}
