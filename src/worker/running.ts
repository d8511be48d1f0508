import { Superseded } from '../server/captures/work/superseded.ts';
import { readJob } from '../server/queue/names.ts';
import type { TakenJob } from '../server/queue/take-job.ts';
import { stillWanted } from './still-wanted.ts';

/** The process stops: what runs is given back. */
export class Stopping extends Error {
  override readonly name = 'Stopping';
}

interface Entry {
  readonly job: TakenJob;
  readonly abort: AbortController;
}

/** What this worker has in hand, so that it can be stopped one by one or all at once. */
export class Running {
  private readonly entries = new Set<Entry>();

  add(job: TakenJob): { signal: AbortSignal; done: () => void } {
    const entry = { job, abort: new AbortController() };
    this.entries.add(entry);
    return { signal: entry.abort.signal, done: () => void this.entries.delete(entry) };
  }

  get count(): number {
    return this.entries.size;
  }

  abortAll(): void {
    for (const { abort } of this.entries) abort.abort(new Stopping('The worker stops'));
  }

  /** A stop was heard for a capture: ends the attempts at it that are no longer wanted. */
  async heardStop(captureId: string): Promise<void> {
    for (const { job, abort } of this.entries) {
      const parsed = readJob.safeParse(job.data);
      if (!parsed.success || parsed.data.captureId !== captureId) continue;
      const wanted = await stillWanted(captureId, parsed.data.revision).catch(() => true);
      if (!wanted) abort.abort(new Superseded(`Capture ${captureId} was stopped or changed`));
    }
  }
}
