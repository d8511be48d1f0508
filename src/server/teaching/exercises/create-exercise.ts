import type { z } from 'zod';
import type { exerciseInput } from '../../../contract/areas/teaching.ts';
import type { PersonCaller } from '../../access.ts';
import { db } from '../../db/client.ts';
import { exercise, exerciseVersion } from '../../db/schema.ts';
import { newId } from '../../ids.ts';
import { checkContent } from './check-content.ts';

/** Makes an exercise with its first version, in one transaction. Gives its id. */
export async function createExercise(
  caller: PersonCaller,
  input: z.output<typeof exerciseInput>,
): Promise<string> {
  const capture = await checkContent(caller, caller.workshopId, input.content);
  const id = newId();
  await db().transaction(async (tx) => {
    await tx.insert(exercise).values({
      id,
      workshopId: capture.workshopId,
      createdBy: caller.personId,
      captureId: capture.id,
      captureSha256: capture.sha256,
      title: input.title,
      state: input.state,
    });
    await tx
      .insert(exerciseVersion)
      .values({ exerciseId: id, version: 1, content: input.content, samplesVersion: capture.samplesVersion });
  });
  return id;
}
