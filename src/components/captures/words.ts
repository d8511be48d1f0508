import type { CaptureJson, CaptureRowJson } from '../../contract/areas/captures.ts';
import type { VerdictName } from '../base/Verdict.tsx';

type Status = CaptureJson['status'];

export const STATUS_WORDS: Record<Status, string> = {
  queued: 'waits its turn',
  reading: 'reading',
  measuring: 'measuring',
  ready: 'ready',
  failed: 'could not be read',
  cancelled: 'stopped',
};

export const isUnderWay = (status: Status): boolean =>
  status === 'queued' || status === 'reading' || status === 'measuring';

/** What the list says of a capture in a shape and a word; null when there is nothing to note. */
export function rowVerdict(
  row: Pick<CaptureRowJson, 'status' | 'notices'>,
): { verdict: VerdictName; word: string } | null {
  if (row.status === 'failed') return { verdict: 'bad', word: STATUS_WORDS.failed };
  if (row.status !== 'ready') return { verdict: 'undecided', word: STATUS_WORDS[row.status] };
  const { bad, watch, first } = row.notices;
  if (bad + watch === 0) return null;
  const others = bad + watch - 1;
  const text = first === null ? 'see its notices' : firstSentence(first);
  return {
    verdict: bad > 0 ? 'bad' : 'watch',
    word: others > 0 ? `${text.replace(/\.$/, '')}, and ${others} more` : text,
  };
}

/** A notice says what was measured first; what it usually means and what to check is on the capture's own page. */
export const firstSentence = (text: string): string => text.split(/(?<=[.!?])\s+(?=\p{Lu})/u)[0] ?? text;

/** A clause as a sentence: capital first, a full stop at the end. Nothing stays nothing. */
export const asSentence = (clause: string): string =>
  clause === '' ? '' : `${clause[0]!.toUpperCase()}${clause.slice(1)}${/[.!?…]$/u.test(clause) ? '' : '.'}`;

/** How sure the program is of a circuit, in a word. The limits are ours: no source. */
export function sureness(confidence: number): { verdict: VerdictName; word: string } {
  if (confidence >= 0.8) return { verdict: 'good', word: 'quite sure' };
  if (confidence >= 0.5) return { verdict: 'watch', word: 'please confirm' };
  return { verdict: 'undecided', word: 'a guess, please choose' };
}
