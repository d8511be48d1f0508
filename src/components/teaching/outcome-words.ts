import type { AttemptJson } from '../../contract/areas/teaching.ts';
import type { VerdictName } from '../base/Verdict.tsx';

type Marks = AttemptJson['marks'];
export type Part = keyof Marks;

export const PART_WORDS: Record<Part, string> = {
  stretch: 'stretch',
  circuit: 'circuit',
  cause: 'cause',
  value: 'value',
  text: 'text',
};

const PARTS = Object.keys(PART_WORDS) as Part[];

export const OUTCOME_VERDICT: Record<AttemptJson['outcome'], VerdictName> = {
  right: 'good',
  partly: 'watch',
  wrong: 'bad',
  waiting: 'undecided',
};

export const OUTCOME_WORD: Record<AttemptJson['outcome'], string> = {
  right: 'right',
  partly: 'partly right',
  wrong: 'not right',
  waiting: 'waits for judging',
};

const listed = (parts: readonly Part[]) => parts.map((part) => PART_WORDS[part]).join(' and ');

/** The outcome in words: "both right", "stretch right, cause not", "neither". */
export function outcomeWords({ marks, outcome }: Pick<AttemptJson, 'marks' | 'outcome'>): string {
  const asked = PARTS.filter((part) => marks[part] !== undefined);
  const having = (mark: string) => asked.filter((part) => marks[part]?.mark === mark);
  const waiting = having('waiting');
  if (waiting.length > 0) {
    const right = having('right');
    return right.length > 0 ? `${listed(right)} right, text waits for judging` : 'text waits for judging';
  }
  if (outcome === 'right')
    return asked.length === 1 ? 'right' : asked.length === 2 ? 'both right' : 'all right';
  if (outcome === 'wrong')
    return asked.length === 1 ? 'not right' : asked.length === 2 ? 'neither right' : 'none right';
  if (asked.length === 1) return 'partly right';
  const wrong = asked.filter((part) => marks[part]?.mark !== 'right');
  const right = having('right');
  return right.length === 0 ? 'partly right' : `${listed(right)} right, ${listed(wrong)} not`;
}
