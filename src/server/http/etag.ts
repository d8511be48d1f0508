import { ApiError } from '../errors.ts';

/** The ETag of what people edit: its edition. */
export const etagOf = (edition: number): string => `"${edition}"`;

/**
 * Checks If-Match against the present edition: stale is 412. Absent or `*` passes. The write itself must carry the edition in
 * its WHERE too (see `expectedEdition`), as somebody may come between.
 */
export function checkIfMatch(ifMatch: string | undefined, edition: number): void {
  if (ifMatch === undefined || ifMatch.trim() === '*') return;
  const tags = ifMatch.split(',').map((tag) => tag.trim().replace(/^W\//, ''));
  if (!tags.includes(etagOf(edition))) throw new ApiError('stale');
}
