import type { NextJson } from '../../contract/areas/path.ts';
import type { VerdictName } from '../base/Verdict.tsx';

type Result = NextJson['steps'][number]['result'];

/** Each result's shape; the word always stands beside it. */
export const SHAPE: Readonly<Record<Result, VerdictName>> = {
  good: 'good',
  bad: 'bad',
  unclear: 'undecided',
  skipped: 'info',
};

export const CAUSE_SHAPE: Readonly<Record<NextJson['causes'][number]['state'], VerdictName>> = {
  shown: 'bad',
  possible: 'undecided',
  'ruled out': 'good',
};
