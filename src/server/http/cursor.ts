import { z } from 'zod';
import { ApiError } from '../errors.ts';

const position = z.tuple([z.string().max(40), z.string().max(60)]);

/** Where a keyset page ended: a sort key as text (a time or a number) and the id that breaks ties. */
export interface Position {
  readonly key: string;
  readonly id: string;
}

/** An opaque cursor. */
export const encodeCursor = ({ key, id }: Position): string =>
  Buffer.from(JSON.stringify([key, id])).toString('base64url');

/** Reads a cursor; one that is not ours is 422. */
export function decodeCursor(cursor: string | undefined): Position | undefined {
  if (cursor === undefined) return undefined;
  try {
    const [key, id] = position.parse(JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8')));
    return { key, id };
  } catch {
    throw new ApiError('invalid', {
      details: [{ path: 'cursor', message: 'is not a cursor of this list' }],
    });
  }
}

/** A position whose key is a time; JavaScript's milliseconds lose PostgreSQL's microseconds, so keys come from `timeKey`. */
export function decodeTimeCursor(cursor: string | undefined): Position | undefined {
  const position = decodeCursor(cursor);
  if (position === undefined || /^\d{4}-\d\d-\d\d \d\d:\d\d:\d\d(\.\d+)?\+00$/.test(position.key))
    return position;
  throw new ApiError('invalid', { details: [{ path: 'cursor', message: 'is not a cursor of this list' }] });
}

/** Cuts the row that was fetched beyond the limit and tells where the next page starts. */
export function page<T>(
  rows: readonly T[],
  limit: number,
  positionOf: (row: T) => Position,
): { items: T[]; nextCursor: string | null } {
  const items = rows.slice(0, limit);
  const last = items.at(-1);
  return {
    items,
    nextCursor: rows.length > limit && last !== undefined ? encodeCursor(positionOf(last)) : null,
  };
}
