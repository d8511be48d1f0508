import { and, eq, isNull } from 'drizzle-orm';
import { webhook, webhookDelivery } from '../../db/schema.ts';
import { newId } from '../../ids.ts';
import { QUEUES } from '../../queue/names.ts';
import type { Transaction } from '../../queue/transaction.ts';

/** What addresses are told of. */
export const CAPTURE_MEASURED = 'capture.measured';

export interface CaptureMeasured {
  readonly workshopId: string;
  readonly captureId: string;
  readonly title: string;
  readonly revision: number;
  readonly engine: string;
}

/** Puts the news of a measured capture on its way to each address of the workshop, in the transaction that measured it. */
export async function queueCaptureMeasured(
  { tx, send }: Pick<Transaction, 'tx' | 'send'>,
  { workshopId, captureId, title, revision, engine }: CaptureMeasured,
): Promise<void> {
  const addresses = await tx
    .select({ id: webhook.id })
    .from(webhook)
    .where(and(eq(webhook.workshopId, workshopId), isNull(webhook.deletedAt)));
  for (const { id: webhookId } of addresses) {
    const id = newId();
    const payload = {
      event: CAPTURE_MEASURED,
      delivery: id,
      at: new Date().toISOString(),
      capture: { id: captureId, title, revision, engine },
    };
    await tx.insert(webhookDelivery).values({ id, webhookId, event: CAPTURE_MEASURED, payload });
    await send(QUEUES.webhook, { deliveryId: id });
  }
}
