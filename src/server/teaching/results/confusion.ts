import type { ResultsJson } from '../../../contract/areas/teaching.ts';

export interface CauseAnswer {
  readonly was: string;
  readonly chosen: string;
  /** Words of both, by key. */
  readonly words: ReadonlyMap<string, string>;
}

/** How often each cause (rows) was taken for each (columns). Causes in the order in which they first occur. */
export function confusion(answers: readonly CauseAnswer[]): ResultsJson['confusion'] {
  const causes = new Map<string, string>();
  for (const { was, words } of answers) if (!causes.has(was)) causes.set(was, words.get(was) ?? was);
  for (const { chosen, words } of answers)
    if (!causes.has(chosen)) causes.set(chosen, words.get(chosen) ?? chosen);
  const keys = [...causes.keys()];
  const counts = keys.map(() => keys.map(() => 0));
  for (const { was, chosen } of answers) {
    const row = counts[keys.indexOf(was)];
    const column = keys.indexOf(chosen);
    if (row !== undefined) row[column] = (row[column] ?? 0) + 1;
  }
  return { causes: keys.map((key) => ({ key, text: causes.get(key) ?? key })), counts, n: answers.length };
}
