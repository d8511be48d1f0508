import type { AttemptJson } from '../../../contract/areas/teaching.ts';

interface Stretch {
  readonly from: number;
  readonly to: number;
}
type Mark = NonNullable<AttemptJson['marks']['stretch']>;

/** A stretch may be this many times longer than what it points at, as fingers are wide … */
const TIMES = 10;
/** … but not longer than this share of the trace, or half as long again as the answer itself where that is long. */
const MOST_SHARE = 0.25;
const LONG_TIMES = 1.5;
const HOLDS_SHARE = 0.5;

const lengthOf = ({ from, to }: Stretch) => to - from;
const overlap = (a: Stretch, b: Stretch) => Math.max(0, Math.min(a.to, b.to) - Math.max(a.from, b.from));

/** The longest stretch that still points at one of the answer's, unless the author said how long. */
export function longestAllowedS(answers: readonly Stretch[], traceS: number): number {
  const longest = Math.max(0, ...answers.map(lengthOf));
  return Math.max(LONG_TIMES * longest, Math.min(TIMES * longest, MOST_SHARE * traceS));
}

/** Right when it holds at least half of one of the answer's stretches and is short enough to point at it. */
export function markStretch(
  given: Stretch,
  answers: readonly Stretch[],
  atMostS: number | null,
  traceS: number,
): Mark {
  const holds = answers.some((answer) => overlap(given, answer) >= HOLDS_SHARE * lengthOf(answer));
  if (!holds) return { mark: 'wrong', why: 'lies elsewhere' };
  if (lengthOf(given) > (atMostS ?? longestAllowedS(answers, traceS)))
    return { mark: 'wrong', why: 'holds the place, but is too long to point at it' };
  return { mark: 'right', why: 'holds the place' };
}
