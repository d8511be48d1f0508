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

/**
 * Runs one task in a thread and gives its messages one after the other, each when the one before was dealt with. Ends the
 * thread when `signal` fires, and then throws its reason.
 */
export async function runThread(
  task: ThreadTask,
  signal: AbortSignal,
  onMessage: (message: ThreadMessage) => Promise<void>,
): Promise<void> {
  signal.throwIfAborted();
  const thread = new Worker(new URL('./capture.thread.js', import.meta.url), {
    workerData: task,
    resourceLimits: { maxOldGenerationSizeMb: HEAP_MIB },
  });
  let dealing = Promise.resolve();
  let fault: unknown;
  thread.on('message', (message: ThreadMessage) => {
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
  const stop = () => void thread.terminate();
  signal.addEventListener('abort', stop, { once: true });
  try {
    await new Promise<void>((resolve) => thread.once('exit', () => resolve()));
    await dealing;
  } finally {
    signal.removeEventListener('abort', stop);
  }
  signal.throwIfAborted();
  if (fault !== undefined) throw fault;
}
