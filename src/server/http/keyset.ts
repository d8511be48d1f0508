import { type AnyColumn, type SQL, sql } from 'drizzle-orm';
import type { Position } from './cursor.ts';

/** A time as text with all of PostgreSQL's microseconds, which a JavaScript date would lose. */
export const timeKey = (column: AnyColumn): SQL<string> =>
  sql<string>`to_char(${column} at time zone 'UTC', 'YYYY-MM-DD HH24:MI:SS.US') || '+00'`;

/** Rows after the position in a list ordered by time and id, both falling. */
export const olderThan = (time: AnyColumn, id: AnyColumn, position: Position | undefined): SQL | undefined =>
  position && sql`(${time}, ${id}) < (${position.key}::timestamptz, ${position.id})`;

/** The same, both rising. */
export const newerThan = (time: AnyColumn, id: AnyColumn, position: Position | undefined): SQL | undefined =>
  position && sql`(${time}, ${id}) > (${position.key}::timestamptz, ${position.id})`;
