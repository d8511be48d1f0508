import { randomInt } from 'node:crypto';
import { STOP_CHANNEL } from '../server/captures/cancel-capture.ts';
import { LOCK_CLASS, LockSession } from '../server/queue/lock-session.ts';
import { WORK_CHANNEL } from '../server/queue/transaction.ts';

/**
 * The worker's name: a number whose advisory lock it holds as long as its connection lives. Every connection gets a new one,
 * so that work taken under a connection that broke belongs to nobody.
 */
export class WorkerLock {
  readonly session: LockSession;
  private current: number | null = null;

  constructor() {
    this.session = new LockSession([WORK_CHANNEL, STOP_CHANNEL], async (client) => {
      for (;;) {
        const number = randomInt(1, 2 ** 31 - 1);
        const { rows } = await client.query<{ held: boolean }>(
          'select pg_try_advisory_lock($1, $2) as held',
          [LOCK_CLASS.worker, number],
        );
        if (rows[0]?.held !== true) continue;
        this.current = number;
        return;
      }
    });
    this.session.on('lost', () => {
      this.current = null;
    });
  }

  /** Null while the connection is broken: then no work is taken. */
  get number(): number | null {
    return this.session.isOpen ? this.current : null;
  }
}
