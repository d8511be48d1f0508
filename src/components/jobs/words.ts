import type { JobJson } from '../../contract/areas/jobs.ts';
import type { VerdictName } from '../base/Verdict.tsx';

export type JobState = JobJson['state'];
export type Vehicle = JobJson['vehicle'];

export const STATE_WORDS: Record<JobState, { word: string; verdict: VerdictName }> = {
  open: { word: 'open', verdict: 'undecided' },
  waiting: { word: 'waiting', verdict: 'watch' },
  closed: { word: 'closed', verdict: 'good' },
};

/** J-0412 */
export const jobName = (number: number): string => `J-${String(number).padStart(4, '0')}`;

/** Make, model and year as far as they are known. */
export const vehicleText = ({ make, model, year }: Pick<Vehicle, 'make' | 'model' | 'year'>): string =>
  [[make, model].filter((part) => part !== '').join(' '), year === null ? '' : String(year)]
    .filter((part) => part !== '')
    .join(', ') || 'Vehicle not named';

/** "2 captures, 1 photo" without what there is none of. */
export function countsText(counts: { captures: number; photos: number; entries: number }): string {
  const one = (count: number, word: string, words: string) =>
    count === 0 ? null : `${count} ${count === 1 ? word : words}`;
  return [
    one(counts.captures, 'capture', 'captures'),
    one(counts.photos, 'photo', 'photos'),
    one(counts.entries, 'note', 'notes'),
  ]
    .filter((part) => part !== null)
    .join(', ');
}

/** Codes as people type them: parted by spaces, commas or line breaks. */
export const codesOf = (typed: string): string[] => typed.split(/[\s,;]+/).filter((code) => code !== '');
