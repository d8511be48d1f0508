import type { z } from 'zod';
import type { uploadFields } from '../../contract/areas/captures.ts';
import type { PersonCaller } from '../access.ts';
import { capture } from '../db/schema.ts';
import { QUEUES, type ReadJob } from '../queue/names.ts';
import type { Transaction } from '../queue/transaction.ts';
import { titleOf } from './title-of.ts';

export interface NewCapture {
  readonly id: string;
  readonly caller: Pick<PersonCaller, 'personId' | 'workshopId' | 'role'>;
  readonly fields: z.output<typeof uploadFields>;
  readonly fileName: string;
  readonly originalKey: string;
  readonly bytes: number;
  /** Empty when it could not be had while streaming; then the worker fills it in. */
  readonly sha256: string;
}

/**
 * The row of an upload that has arrived, and the work of reading it, in the caller's transaction: both or neither. A
 * learner's upload is a practice capture.
 */
export async function createCapture({ tx, send }: Pick<Transaction, 'tx' | 'send'>, made: NewCapture) {
  const { fields, caller } = made;
  await tx.insert(capture).values({
    id: made.id,
    workshopId: caller.workshopId,
    createdBy: caller.personId,
    practice: caller.role === 'learner',
    title: fields.title || titleOf(made.fileName),
    note: fields.note ?? '',
    jobId: fields.jobId ?? null,
    cylinders: fields.cylinders ?? null,
    signalRequests: fields.signals ?? [],
    fileName: made.fileName,
    originalKey: made.originalKey,
    bytes: made.bytes,
    sha256: made.sha256,
  });
  await send(QUEUES.read, { captureId: made.id, revision: 1, kind: 'read' } satisfies ReadJob);
  return { id: made.id, status: 'queued' as const };
}
