import type { KnownGoodJson } from '../../contract/areas/library.ts';
import type { VerdictName } from '../base/Verdict.tsx';

export const STATE_WORDS: Record<KnownGoodJson['state'], { verdict: VerdictName; word: string }> = {
  published: { verdict: 'good', word: 'published' },
  proposed: { verdict: 'watch', word: 'waits for review' },
  returned: { verdict: 'undecided', word: 'returned to its author' },
  retired: { verdict: 'info', word: 'retired' },
  superseded: { verdict: 'info', word: 'replaced by a newer version' },
};

export const DECISION_WORDS: Record<KnownGoodJson['reviews'][number]['decision'], string> = {
  publish: 'published it',
  return: 'returned it',
  retire: 'retired it',
};
