import type { TimeAxis } from '../../capture.ts';
import type { Notice } from '../../value.ts';
import { whole } from './whole.ts';

/** A trace in which nothing happens: what that leaves open. `where` names the places to look, as a clause. */
export function flatLine(axis: TimeAxis, level: string, where: string): Notice {
  return {
    code: 'flat-line',
    severity: 'watch',
    text:
      `The trace stays at ${level} and shows no event. A flat line does not show where it comes from: ${where}, or a probe ` +
      'that does not touch. Check the connection and the lead first, then record again while cranking.',
    evidence: whole(axis),
  };
}
