import { setTimeout as sleep } from 'node:timers/promises';
import { STOP_CHANNEL } from '../server/captures/cancel-capture.ts';
import { giveUpFailed } from '../server/captures/work/give-up-failed.ts';
import { queueRemeasuring } from '../server/captures/work/queue-remeasuring.ts';
import { closeDatabase } from '../server/db/client.ts';
import { fillPictures } from '../server/library/fill-pictures.ts';
import { log } from '../server/log.ts';
import { queue, stopQueue } from '../server/queue/boss.ts';
import { QUEUES, type QueueName } from '../server/queue/names.ts';
import { takeBackFromDead } from '../server/queue/take-back.ts';
import { takeJob } from '../server/queue/take-job.ts';
import { ensureBucket } from '../server/storage/ensure-bucket.ts';
import { handleJob } from './handle-job.ts';
import { warmThreads } from './run-thread.ts';
import { Running } from './running.ts';
import { Wakeup } from './wakeup.ts';
import { WorkerLock } from './worker-lock.ts';

/**
 * The background process: takes queued work until it is told to stop. Any number of them run beside each other. On SIGTERM
 * it takes nothing new, finishes what is nearly done and gives the rest back.
 */
const LANES = 2;
const LOOK_MS = 1_000;
const TAKE_BACK_MS = 2_000;
const HOUSEKEEPING_MS = 10 * 60_000;
const FINISH_MS = 5_000;

const running = new Running();
const wakeup = new Wakeup();
const lock = new WorkerLock();
let stopping = false;

lock.session.on('notice', (channel, payload) => {
  if (channel === STOP_CHANNEL) void running.heardStop(payload);
  else wakeup.wake();
});
lock.session.on('lost', () => {
  log.warn('the connection that holds the worker’s lock broke; what runs is given up');
  running.abortAll();
});

/** Looks for work again and again, and waits for notice of it in between. */
async function lane(order: readonly QueueName[]): Promise<void> {
  while (!stopping) {
    const job = await next(order).catch((error: unknown) => {
      log.warn({ err: error }, 'no work could be taken');
      return null;
    });
    if (job === null) {
      await wakeup.wait(LOOK_MS);
      continue;
    }
    const { signal, done } = running.add(job);
    await handleJob(job, signal);
    done();
  }
}

/** What uses cores. */
const HEAVY: readonly QueueName[] = [
  QUEUES.compare,
  QUEUES.read,
  QUEUES.dropSamples,
  QUEUES.sweep,
  QUEUES.remeasure,
];
/** What waits for others has lanes of its own: a slow mail server holds up no capture, a slow webhook no mail. */
const WAITING: readonly (readonly QueueName[])[] = [[QUEUES.mail], [QUEUES.webhook]];

async function next(order: readonly QueueName[]) {
  if (stopping || lock.number === null) return null;
  for (const name of order) {
    const job = await takeJob(name, lock.number);
    if (job !== null) return job;
  }
  return null;
}

/** Runs a chore now and then; one that fails is tried again the next time. */
function every(ms: number, chore: () => Promise<void>): void {
  const run = () =>
    void chore()
      .catch((error: unknown) => log.warn({ err: error }, 'a chore failed'))
      .finally(() => setTimeout(run, ms).unref());
  run();
}

async function takeBack(): Promise<void> {
  const count = await takeBackFromDead();
  if (count === 0) return;
  log.warn({ count }, 'took back the work of a worker that is gone');
  await giveUpFailed();
  wakeup.wake();
}

async function housekeeping(): Promise<void> {
  await giveUpFailed();
  const count = await queueRemeasuring();
  if (count > 0) log.info({ count }, 'captures queued to be measured by this engine');
  const pictures = await fillPictures();
  if (pictures > 0) log.info({ count: pictures }, 'pictures and shapes of known-goods made');
  const boss = await queue();
  await boss.send(QUEUES.sweep, {}, { singletonSeconds: 3600, singletonKey: 'sweep' });
}

/** At the start the services may still be coming up. */
async function whenThere(open: () => Promise<unknown>, what: string): Promise<void> {
  while (!stopping) {
    try {
      await open();
      return;
    } catch (error) {
      log.warn({ err: error }, `waiting for ${what}`);
      await sleep(1_000);
    }
  }
}

async function stop(name: string): Promise<void> {
  if (stopping) return;
  stopping = true;
  log.info({ signal: name, running: running.count }, 'worker stops');
  wakeup.wake();
  for (const end = Date.now() + FINISH_MS; running.count > 0 && Date.now() < end; ) await sleep(50);
  running.abortAll();
  for (const end = Date.now() + 3_000; running.count > 0 && Date.now() < end; ) await sleep(50);
  await lock.session.close();
  await stopQueue();
  await closeDatabase();
  process.exit(0);
}

for (const name of ['SIGTERM', 'SIGINT'] as const) process.on(name, () => void stop(name));

await whenThere(() => queue(true), 'the database');
await whenThere(ensureBucket, 'the store');
await whenThere(() => lock.session.open(), 'the database');
warmThreads(LANES);
log.info({ worker: lock.number }, 'worker ready');
every(TAKE_BACK_MS, takeBack);
every(HOUSEKEEPING_MS, housekeeping);
await Promise.all([...Array.from({ length: LANES }, () => HEAVY), ...WAITING].map(lane));
