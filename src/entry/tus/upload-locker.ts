import { setTimeout as sleep } from 'node:timers/promises';
import { ERRORS, type Lock, type Locker, type RequestRelease } from '@tus/server';
import { ApiError } from '../../server/errors.ts';
import { LOCK_CLASS, LockSession } from '../../server/queue/lock-session.ts';

const RELEASE_CHANNEL = 'gapmark_upload_release';
const AGAIN_MS = 150;
const LONGEST_MS = 20_000;

/**
 * One request at a time on an upload, over all web processes: an advisory lock in PostgreSQL on the process's own
 * connection, gone when the process dies. A newer request asks the holder, wherever it is, to let go: the older one is
 * usually a connection that broke without anybody noticing.
 */
export class UploadLocker implements Locker {
  private readonly session = new LockSession([RELEASE_CHANNEL]);
  private readonly held = new Map<string, RequestRelease>();

  constructor() {
    this.session.on('notice', (_channel, id) => void this.held.get(id)?.());
    this.session.on('lost', () => {
      for (const release of this.held.values()) void release();
    });
  }

  newLock(id: string): Lock {
    return {
      lock: (signal, release) => this.take(id, signal, release),
      unlock: () => this.letGo(id),
    };
  }

  async close(): Promise<void> {
    await this.session.close();
  }

  private async take(id: string, signal: AbortSignal, release: RequestRelease): Promise<void> {
    await this.open();
    for (const end = Date.now() + LONGEST_MS; Date.now() < end; ) {
      if (signal.aborted) throw ERRORS.ABORTED;
      const holder = this.held.get(id);
      if (holder !== undefined) await holder();
      else if (await this.tryTake(id, release)) return;
      else await this.session.query('select pg_notify($1, $2)', [RELEASE_CHANNEL, id]);
      await sleep(AGAIN_MS);
    }
    throw new ApiError('conflict', {
      message: 'Another request is still sending to this upload. What has arrived is kept.',
      hint: 'Ask how far it has come, and go on from there.',
      retryAfterS: 3,
    });
  }

  private async tryTake(id: string, release: RequestRelease): Promise<boolean> {
    // Marked before the answer, so that another request of this process does not take the same session's lock again.
    this.held.set(id, release);
    try {
      const [row] = await this.session.query<{ held: boolean }>(
        'select pg_try_advisory_lock($1, hashtext($2)) as held',
        [LOCK_CLASS.upload, id],
      );
      if (row?.held === true) return true;
    } catch (error) {
      this.held.delete(id);
      throw error;
    }
    this.held.delete(id);
    return false;
  }

  private async letGo(id: string): Promise<void> {
    this.held.delete(id);
    // When the connection broke, the lock is gone already.
    await this.session
      .query('select pg_advisory_unlock($1, hashtext($2))', [LOCK_CLASS.upload, id])
      .catch(() => {});
  }

  /** Connects at the first upload; when the database is away that is 503, and the next request tries again. */
  private async open(): Promise<void> {
    try {
      await this.session.open();
    } catch (cause) {
      throw new ApiError('service_away', { cause, retryAfterS: 3 });
    }
  }
}
