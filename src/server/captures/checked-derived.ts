import type { CaptureRecord } from '../access.ts';
import type { DerivedRequest } from '../db/schema.ts';
import { ApiError } from '../errors.ts';

/**
 * The list of derived signals a person asks for: each has a number of its own below 0 and is made from file columns of signals
 * or from earlier ones of the list. Whether a column is there shows when the file is read.
 */
export function checkedDerived(
  _row: Pick<CaptureRecord, 'id'>,
  wanted: readonly DerivedRequest[],
): DerivedRequest[] {
  const earlier = new Set<number>();
  wanted.forEach((one, place) => {
    const wrong = (path: string, message: string) =>
      new ApiError('invalid', { details: [{ path: `derived.${place}.${path}`, message }] });
    if (earlier.has(one.column)) throw wrong('column', 'is used twice');
    const sources = one.kind === 'difference' ? [one.of, one.less] : [one.of];
    const missing = sources.find((column) => column < 0 && !earlier.has(column));
    if (missing !== undefined) throw wrong('of', `${missing} is no derived signal before this one`);
    earlier.add(one.column);
  });
  return [...wanted];
}
