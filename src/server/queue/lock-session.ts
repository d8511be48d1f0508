import { EventEmitter } from 'node:events';
import pg from 'pg';
import { config } from '../config.ts';
import { log } from '../log.ts';

/** Classes of advisory locks (the first of the two keys), so that different uses never meet. */
export const LOCK_CLASS = { worker: 0x676d_0001, upload: 0x676d_0002, remeasure: 0x676d_0003 } as const;

interface Events {
  /** The connection broke: every lock held through it is gone. */
  lost: [];
  back: [];
  notice: [channel: string, payload: string];
}

/**
 * One connection that stays open and holds session advisory locks. A process that dies loses it, and with it the locks, at
 * once: that is how others know. It also hears notices. When it breaks, `lost` is emitted and it connects again.
 */
export class LockSession extends EventEmitter<Events> {
  private client: pg.Client | undefined;
  private opening: Promise<void> | undefined;
  private closed = false;
  private readonly channels: readonly string[];
  private readonly onConnect: (client: pg.Client) => Promise<void>;

  /** `onConnect` runs on every new connection before it is used, to take the locks that belong to it. */
  constructor(channels: readonly string[], onConnect: (client: pg.Client) => Promise<void> = async () => {}) {
    super();
    this.channels = channels;
    this.onConnect = onConnect;
  }

  /** Connects. Whoever asks while a connection is being made waits for that one: two would hold locks apart. */
  async open(): Promise<void> {
    if (this.client !== undefined) return;
    this.opening ??= this.connect().finally(() => {
      this.opening = undefined;
    });
    await this.opening;
  }

  private async connect(): Promise<void> {
    const client = new pg.Client({
      connectionString: config().databaseUrl,
      connectionTimeoutMillis: 5_000,
      keepAlive: true,
      application_name: 'gapmark lock session',
    });
    client.on('error', () => {});
    client.on('notification', ({ channel, payload }) => this.emit('notice', channel, payload ?? ''));
    await client.connect();
    try {
      // A machine that vanishes without a word is noticed after some twenty seconds.
      await client.query(
        'set tcp_keepalives_idle = 10; set tcp_keepalives_interval = 3; set tcp_keepalives_count = 3',
      );
      for (const channel of this.channels) await client.query(`listen ${channel}`);
      await this.onConnect(client);
    } catch (error) {
      await client.end().catch(() => {});
      throw error;
    }
    this.client = client;
    client.once('end', () => {
      if (this.client !== client) return;
      this.client = undefined;
      this.emit('lost');
      void this.reopen();
    });
  }

  get isOpen(): boolean {
    return this.client !== undefined;
  }

  /** Runs a query on the session's connection. Throws when it is not there at the moment. */
  async query<R extends pg.QueryResultRow>(text: string, values: unknown[] = []): Promise<R[]> {
    if (this.client === undefined) throw new Error('Connection terminated: the lock session is not there');
    return (await this.client.query<R>(text, values)).rows;
  }

  async close(): Promise<void> {
    this.closed = true;
    const client = this.client;
    this.client = undefined;
    await client?.end().catch(() => {});
  }

  private async reopen(): Promise<void> {
    while (!this.closed && this.client === undefined) {
      await new Promise((resolve) => setTimeout(resolve, 1_000));
      if (this.closed) return;
      try {
        await this.open();
        this.emit('back');
      } catch (error) {
        log.warn({ err: error }, 'the database is away; trying again');
      }
    }
  }
}
