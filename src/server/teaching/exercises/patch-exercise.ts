import { and, eq, isNull, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { exercisePatch } from '../../../contract/areas/teaching.ts';
import type { ExerciseRecord, PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { exercise, exerciseVersion } from '../../db/schema.ts';
import { ApiError } from '../../errors.ts';
import { canonicalJson } from '../../http/idempotency.ts';
import { checkContent } from './check-content.ts';
import { versionOf } from './version.ts';

/**
 * Changes title, state or content. Content that differs becomes a new version; attempts keep the one they answered. As it
 * was opened: a change in between is 412.
 */
export async function patchExercise(
  caller: PersonCaller,
  row: ExerciseRecord,
  patch: z.output<typeof exercisePatch>,
): Promise<ExerciseRecord> {
  const { content } = patch;
  const capture = content && (await checkContent(caller, row.workshopId, content));
  const present = content && (await versionOf(row.id, row.version));
  const differs =
    content !== undefined &&
    (canonicalJson(content) !== canonicalJson(present?.content) ||
      present?.samplesVersion !== capture?.samplesVersion);
  const version = differs ? row.version + 1 : row.version;
  return db().transaction(async (tx) => {
    const [changed] = await tx
      .update(exercise)
      .set({
        ...(patch.title === undefined ? {} : { title: patch.title }),
        ...(patch.state === undefined ? {} : { state: patch.state }),
        ...(capture === undefined ? {} : { captureId: capture.id, captureSha256: capture.sha256 }),
        version,
        edition: sql`${exercise.edition} + 1`,
        updatedAt: sql`now()`,
      })
      .where(and(eq(exercise.id, row.id), eq(exercise.edition, row.edition), isNull(exercise.deletedAt)))
      .returning();
    if (changed === undefined) throw new ApiError('stale');
    if (differs && capture !== undefined)
      await tx
        .insert(exerciseVersion)
        .values({ exerciseId: row.id, version, content, samplesVersion: capture.samplesVersion });
    return { ...changed, heldRole: row.heldRole };
  });
}
