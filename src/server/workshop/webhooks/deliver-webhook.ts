import { eq, sql } from 'drizzle-orm';
import { endJob } from '../../captures/work/end-job.ts';
import { db } from '../../db/client.ts';
import { webhook, webhookDelivery } from '../../db/schema.ts';
import { giveBack } from '../../queue/give-back.ts';
import { webhookJob } from '../../queue/names.ts';
import { completeJob, ownJob } from '../../queue/own-job.ts';
import type { TakenJob } from '../../queue/take-job.ts';
import { inTransaction } from '../../queue/transaction.ts';
import { unseal } from '../../seal.ts';
import { type Outcome, sendWebhook } from './send-webhook.ts';

const TRIES = 8;

/** Seconds between tries: 5, 20, 80 … some seven hours in all. */
export const restAfterTry = (tries: number): number => 5 * 4 ** (tries - 1);

/** Sends one event to one address and notes what became of it; a failed one comes again, with growing pauses, then no more. */
export async function deliverWebhook(job: TakenJob): Promise<void> {
  const { deliveryId } = webhookJob.parse(job.data);
  const [found] = await db()
    .select({ delivery: webhookDelivery, hook: webhook })
    .from(webhookDelivery)
    .innerJoin(webhook, eq(webhook.id, webhookDelivery.webhookId))
    .where(eq(webhookDelivery.id, deliveryId));
  if (found === undefined || found.hook.deletedAt !== null || found.delivery.state !== 'waiting')
    return endJob(job);
  const { delivery, hook } = found;
  const outcome = await sendWebhook({
    url: hook.url,
    key: unseal('webhook key', hook.sealedKey),
    id: delivery.id,
    event: delivery.event,
    body: JSON.stringify(delivery.payload),
  });
  const tries = delivery.tries + 1;
  const again = !outcome.delivered && tries < TRIES;
  await note(job, deliveryId, outcome, tries, again);
  if (again) await giveBack(job, restAfterTry(tries));
}

async function note(job: TakenJob, deliveryId: string, outcome: Outcome, tries: number, again: boolean) {
  await inTransaction(async ({ tx, queueDb }) => {
    await ownJob(queueDb, job);
    await tx
      .update(webhookDelivery)
      .set({
        state: outcome.delivered ? 'delivered' : again ? 'waiting' : 'given up',
        tries,
        status: outcome.status,
        error: outcome.error,
        triedAt: sql`now()`,
      })
      .where(eq(webhookDelivery.id, deliveryId));
    if (!again) await completeJob(queueDb, job);
  });
}
