import { dropSamples } from '../server/captures/work/drop-samples.ts';
import { endJob } from '../server/captures/work/end-job.ts';
import { giveUpFailed } from '../server/captures/work/give-up-failed.ts';
import { Superseded } from '../server/captures/work/superseded.ts';
import { sweep } from '../server/captures/work/sweep.ts';
import { ApiError } from '../server/errors.ts';
import { isServiceAway } from '../server/http/service-away.ts';
import { giveUpComparisons } from '../server/library/give-up-comparisons.ts';
import { runComparison } from '../server/library/run-comparison.ts';
import { log } from '../server/log.ts';
import { deliverMail, MailAway } from '../server/mail/deliver-mail.ts';
import { failJob } from '../server/queue/fail-job.ts';
import { giveBack } from '../server/queue/give-back.ts';
import { captureJob, comparisonJob, QUEUES } from '../server/queue/names.ts';
import { StaleAttempt } from '../server/queue/own-job.ts';
import type { TakenJob } from '../server/queue/take-job.ts';
import { sweepPeople } from '../server/workshop/sweep-people.ts';
import { deliverWebhook } from '../server/workshop/webhooks/deliver-webhook.ts';
import { remeasureCapture } from './remeasure-capture.ts';
import { Stopping } from './running.ts';
import { workOnCapture } from './work-on-capture.ts';

/** After a service was away a job rests this long, longer with every take. */
const restS = (takes: number) => Math.min(60, 2 * takes);

/** Does one job and leaves it done, given back or counted as failed. Never throws. */
export async function handleJob(job: TakenJob, signal: AbortSignal): Promise<void> {
  const started = performance.now();
  const about = { job: job.id, queue: job.name, take: job.takes };
  try {
    await work(job, signal);
    log.info({ ...about, ms: Math.round(performance.now() - started) }, 'job done');
  } catch (error) {
    await settle(job, error, about).catch((fault: unknown) =>
      // The database is away: the lock goes with it, and the job is taken back from a worker that is not there.
      log.warn({ ...about, err: fault }, 'job left to be taken back'),
    );
  }
}

async function work(job: TakenJob, signal: AbortSignal): Promise<void> {
  switch (job.name) {
    case QUEUES.read:
      return workOnCapture(job, signal);
    case QUEUES.compare:
      await runComparison(comparisonJob.parse(job.data).comparisonId);
      return endJob(job);
    case QUEUES.remeasure:
      return remeasureCapture(job, signal);
    case QUEUES.dropSamples:
      await dropSamples(captureJob.parse(job.data).captureId);
      return endJob(job);
    case QUEUES.sweep:
      log.info({ ...(await sweep()), ...(await sweepPeople()) }, 'swept');
      return endJob(job);
    case QUEUES.mail:
      return deliverMail(job);
    case QUEUES.webhook:
      return deliverWebhook(job);
  }
}

async function settle(job: TakenJob, error: unknown, about: object): Promise<void> {
  if (error instanceof StaleAttempt) return log.info(about, 'attempt was given up before');
  if (error instanceof Superseded) {
    log.info(about, 'capture was stopped or changed');
    return endJob(job);
  }
  if (error instanceof Stopping) return giveBack(job, 0);
  if (error instanceof MailAway) {
    log.warn({ ...about, err: error.cause }, 'the mail server is away; the mail is kept');
    return giveBack(job, restS(job.takes));
  }
  if ((error instanceof ApiError && error.code === 'service_away') || isServiceAway(error)) {
    log.warn({ ...about, err: error }, 'a service is away; the job rests');
    return giveBack(job, restS(job.takes));
  }
  log.error({ ...about, err: error }, 'attempt failed');
  await failJob(job);
  await giveUpFailed();
  await giveUpComparisons();
}
