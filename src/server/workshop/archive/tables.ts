/**
 * What of each table goes into a workshop's archive; the columns left out take their defaults when it is read back. Only what is
 * listed goes in, so a table or secret added later does not leave by itself.
 */
export const EXPORTED: Readonly<Record<string, { readonly without: readonly string[] }>> = {
  job: { without: ['search'] },
  job_entry: { without: [] },
  job_check: { without: [] },
  job_overrule: { without: [] },
  /** Read and measured anew from the original. */
  capture: {
    without: [
      'status',
      'progress',
      'error',
      'revision',
      'samples_version',
      'axis',
      'samples',
      'reading',
      'preview',
      'original_key',
    ],
  },
  mark: { without: [] },
  /** For the answers that came by them; the links themselves have ended. */
  share_link: { without: ['secret_hash', 'withdrawn_at'] },
  answer: { without: [] },
  known_good: { without: [] },
  known_good_signal: { without: [] },
  known_good_review: { without: [] },
  comparison: { without: [] },
  exercise: { without: [] },
  exercise_version: { without: [] },
  attempt: { without: [] },
  teaching_set: { without: [] },
  teaching_set_item: { without: [] },
};

/** What stays behind, and why. */
export const LEFT_OUT: Readonly<Record<string, string>> = {
  membership: 'people are invited anew; their names stay beside what they made',
  token: 'secrets do not travel',
  invitation: 'secrets do not travel',
  webhook: 'keys do not travel, and nobody is to be told twice',
  webhook_delivery: 'hangs on webhooks',
  audit: 'tells of people and addresses; it stays where it was written',
  upload: 'what has not arrived yet',
  job_photo: 'photos do not travel yet',
  shape_edition: 'a counter of this installation',
  capture_signal: 'made again from the original',
  teaching_set_person: 'whom a set was set for: people are invited anew',
  measurement: 'made again from the original',
};
