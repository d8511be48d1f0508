import type { AttemptJson } from '../../../contract/areas/teaching.ts';

/** All right, some right, none right, or waiting for an instructor's judgement. */
export function outcomeOf(marks: AttemptJson['marks']): AttemptJson['outcome'] {
  const each = Object.values(marks).flatMap((mark) => (mark === undefined ? [] : [mark.mark]));
  if (each.includes('waiting')) return 'waiting';
  if (each.every((mark) => mark === 'right')) return 'right';
  return each.some((mark) => mark === 'right' || mark === 'partly') ? 'partly' : 'wrong';
}
