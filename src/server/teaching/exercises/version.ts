import { and, eq } from 'drizzle-orm';
import { db, type Executor } from '../../db/client.ts';
import { exerciseVersion } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';

export type VersionRecord = typeof exerciseVersion.$inferSelect;

/** One version of an exercise: what it asked and its answer. */
export async function versionOf(
  exerciseId: string,
  version: number,
  on: Executor = db(),
): Promise<VersionRecord> {
  const [found] = await on
    .select()
    .from(exerciseVersion)
    .where(and(eq(exerciseVersion.exerciseId, exerciseId), eq(exerciseVersion.version, version)));
  if (found === undefined) throw new ApiError('not_found');
  return found;
}
