import type { PersonCaller } from '../../access.ts';
import type { Executor } from '../../db/client.ts';
import { jobEntry } from '../../db/schema.ts';
import { newId } from '../../ids.ts';

/** A line in the job's timeline about what happened to the job itself. */
export async function noteEvent(
  tx: Executor,
  jobId: string,
  by: Pick<PersonCaller, 'personId' | 'name'>,
  text: string,
): Promise<void> {
  await tx
    .insert(jobEntry)
    .values({ id: newId(), jobId, createdBy: by.personId, author: by.name, kind: 'event', text });
}
