import { Worker } from 'node:worker_threads';
import type { ThreadMessage, ThreadTask } from './thread-messages.ts';

/** The thread ended with a fault: `outOfMemory` when the file needs more memory than a thread may have. */
export class ThreadFault extends Error {
  override readonly name = 'ThreadFault';
  readonly outOfMemory: boolean;

  constructor(message: string, outOfMemory: boolean, cause?: unknown) {
    super(message, { cause });
    this.outOfMemory = outOfMemory;
  }
}

/** Objects and text of the thread; samples lie outside of it. */
const HEAP_MIB = 1024;
/** After a larger original the thread ends, so that its memory goes back to the system. */
const KEEP_AFTER_BYTES = 32 * 1024 * 1024;

/** Threads that wait for a task: starting one costs more than most captures. */
const idle: Worker[] = [];

/** Starts threads before they are needed. */
export function warmThreads(count: number): void {
  while (idle.length < count) rest(start());
}

/**
 * Runs one task in a thread and gives its messages one after the other, each when the one before was dealt with. Ends the
 * thread at once when `signal` fires, and then throws its reason.
 */
export async function runThread(
  task: ThreadTask,
  signal: AbortSignal,
  onMessage: (message: ThreadMessage) => Promise<void>,
): Promise<void> {
  signal.throwIfAborted();
  const thread = idle.pop() ?? start();
  thread.removeAllListeners();
  thread.ref();
  let dealing = Promise.resolve();
  let fault: unknown;
  const ended = new Promise<'done' | 'gone'>((resolve) => {
    thread.on('message', (message: ThreadMessage) => {
      if (message.type === 'done') return resolve('done');
      dealing = dealing
        .then(() => (fault === undefined ? onMessage(message) : undefined))
        .catch((error: unknown) => {
          fault ??= error;
          void thread.terminate();
        });
    });
    thread.on('error', (error: Error & { code?: string }) => {
      fault ??= new ThreadFault(error.message, error.code === 'ERR_WORKER_OUT_OF_MEMORY', error);
    });
    thread.once('exit', () => resolve('gone'));
  });
  const stop = () => void thread.terminate();
  signal.addEventListener('abort', stop, { once: true });
  thread.postMessage(task);
  const end = await ended;
  await dealing;
  signal.removeEventListener('abort', stop);
  if (end === 'done' && fault === undefined && !signal.aborted && task.bytes <= KEEP_AFTER_BYTES)
    rest(thread);
  else void thread.terminate();
  signal.throwIfAborted();
  if (fault !== undefined) throw fault;
  if (end === 'gone') throw new ThreadFault('the thread ended before its task', false);
}

function start(): Worker {
  return new Worker(new URL('./capture.thread.js', import.meta.url), {
    resourceLimits: { maxOldGenerationSizeMb: HEAP_MIB },
  });
}

/** Lays a thread by. One that dies while it waits is forgotten. */
function rest(thread: Worker): void {
  thread.removeAllListeners();
  thread.on('error', () => {});
  thread.once('exit', () => {
    const place = idle.indexOf(thread);
    if (place >= 0) idle.splice(place, 1);
  });
  thread.unref();
  idle.push(thread);
}
