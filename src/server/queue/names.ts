import { z } from 'zod';

/** The queues of background work. */
export const QUEUES = {
  /** Read a capture's original and measure it, or only measure it again. */
  read: 'read-capture',
  /** Compare a signal with its references. */
  compare: 'compare',
  /** Measure again what an older engine measured; after everything that a person waits for. */
  remeasure: 'remeasure-capture',
  /** Remove samples that no row names any more. */
  dropSamples: 'drop-samples',
  /** Remove what was deleted 30 days ago and uploads that were given up. */
  sweep: 'sweep',
  /** Send a mail. */
  mail: 'mail',
  /** Tell an address of an event. */
  webhook: 'webhook',
} as const;

export type QueueName = (typeof QUEUES)[keyof typeof QUEUES];

export const readJob = z.object({
  captureId: z.string(),
  revision: z.number().int(),
  kind: z.enum(['read', 'measure']),
});
export type ReadJob = z.infer<typeof readJob>;

export const comparisonJob = z.object({ comparisonId: z.string() });

export const captureJob = z.object({ captureId: z.string() });

export const mailJob = z.object({ mailId: z.string() });

export const webhookJob = z.object({ deliveryId: z.string() });
