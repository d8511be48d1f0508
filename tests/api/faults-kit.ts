import { type ChildProcess, spawn } from 'node:child_process';
import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import { request } from 'node:http';
import { connect, createServer, type Server, type Socket } from 'node:net';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import pg from 'pg';

/**
 * Services of their own for tests that take something away: PostgreSQL, store and mail server behind gates that can be shut, and as many
 * web and worker processes as a test wants, each of which it may kill.
 */
const root = resolve(import.meta.dirname, '../..');
const dist = resolve(root, process.env.GAPMARK_DIST ?? 'dist');

/** A TCP gate: shut, it refuses what is new and breaks what runs. */
export class Gate {
  private server: Server | undefined;
  private readonly sockets = new Set<Socket>();
  private readonly target: number;
  port = 0;

  constructor(target: number) {
    this.target = target;
  }

  async open(): Promise<void> {
    const server = createServer((near) => {
      const far = connect(this.target, '127.0.0.1');
      for (const socket of [near, far]) {
        this.sockets.add(socket);
        socket.on('error', () => {});
        socket.on('close', () => {
          this.sockets.delete(socket);
          near.destroy();
          far.destroy();
        });
      }
      near.pipe(far);
      far.pipe(near);
    });
    await new Promise<void>((done, fail) => {
      server.once('error', fail);
      server.listen(this.port, '127.0.0.1', () => done());
    });
    const address = server.address();
    if (address !== null && typeof address === 'object') this.port = address.port;
    this.server = server;
  }

  async shut(): Promise<void> {
    const server = this.server;
    this.server = undefined;
    for (const socket of this.sockets) socket.destroy();
    await new Promise<void>((done) => (server === undefined ? done() : server.close(() => done())));
  }
}

export interface Process {
  readonly child: ChildProcess;
  readonly origin: string;
  log(): string;
  /** Sends a signal and waits for the end; gives the seconds that it took. */
  end(signal: NodeJS.Signals): Promise<number>;
}

export interface Stage {
  readonly database: Gate;
  readonly store: Gate;
  readonly mail: Gate;
  /** Where caught mail is read. */
  readonly mailPage: string;
  readonly pool: pg.Pool;
  web(): Promise<Process>;
  worker(): Promise<Process>;
  close(): Promise<void>;
}

/** `settings`: more of the product's own. */
export async function openStage(settings: Readonly<Record<string, string>> = {}): Promise<Stage> {
  const dataDir = mkdtempSync(join(tmpdir(), 'gapmark-faults-'));
  chmodSync(dataDir, 0o711);
  const services = start(['scripts/services.mjs', '--data', dataDir], process.env);
  await until(() => services.log().includes('READY=1'), 120, services.log);
  const given = Object.fromEntries(
    services
      .log()
      .split('\n')
      .map((line) => /^([A-Z0-9_]+)=(.*)$/.exec(line))
      .filter((match) => match !== null)
      .map((match) => [match[1]!, match[2]!]),
  );
  const direct = new URL(given.DATABASE_URL!);
  const storeUrl = new URL(given.S3_ENDPOINT!);
  const database = new Gate(Number(direct.port));
  const store = new Gate(Number(storeUrl.port));
  const mail = new Gate(Number(new URL(given.SMTP_URL!).port));
  await Promise.all([database.open(), store.open(), mail.open()]);
  const gated = new URL(given.DATABASE_URL!);
  gated.port = String(database.port);
  const env = {
    ...process.env,
    ...given,
    DATABASE_URL: gated.href,
    S3_ENDPOINT: `http://127.0.0.1:${store.port}`,
    SMTP_URL: `smtp://127.0.0.1:${mail.port}`,
    ...settings,
    NODE_ENV: 'production',
    HOST: '127.0.0.1',
  };
  const migrated = start([join(dist, 'tools/migrate.js')], env);
  await new Promise((done) => migrated.child.once('exit', done));
  const pool = new pg.Pool({ connectionString: given.DATABASE_URL, max: 3 });
  const running: Process[] = [];
  const keep = (made: Process) => {
    running.push(made);
    return made;
  };
  return {
    database,
    store,
    mail,
    mailPage: given.MAIL_PAGE!,
    pool,
    async web() {
      const port = await freePort();
      const origin = `http://127.0.0.1:${port}`;
      const made = keep(
        start([join(dist, 'entry/main.js')], { ...env, PORT: String(port), GAPMARK_ORIGIN: origin }, origin),
      );
      await until(() => isHealthy(origin), 90, made.log);
      return made;
    },
    async worker() {
      const made = keep(start([join(dist, 'worker/main.js')], env));
      await until(() => made.log().includes('worker ready'), 90, made.log);
      return made;
    },
    async close() {
      await Promise.all(running.map((one) => one.end('SIGKILL')));
      await pool.end();
      await Promise.all([database.shut(), store.shut(), mail.shut()]);
      await services.end('SIGTERM');
      rmSync(dataDir, { recursive: true, force: true });
    },
  };
}

function start(args: string[], env: NodeJS.ProcessEnv, origin = ''): Process {
  const child = spawn(process.execPath, args, { cwd: root, env, stdio: ['ignore', 'pipe', 'pipe'] });
  let text = '';
  for (const stream of [child.stdout, child.stderr]) {
    stream.on('data', (chunk) => {
      text += chunk;
    });
  }
  return {
    child,
    origin,
    log: () => text,
    async end(signal) {
      const began = Date.now();
      if (child.exitCode === null && child.signalCode === null) {
        const gone = new Promise((done) => child.once('exit', done));
        child.kill(signal);
        await gone;
      }
      return (Date.now() - began) / 1000;
    },
  };
}

/** Waits for something that takes as long as it takes on a busy machine; says what the process wrote when it never comes. */
export async function until(
  test: () => boolean | Promise<boolean>,
  seconds: number,
  log: () => string = () => '',
): Promise<void> {
  for (const end = Date.now() + seconds * 1000; Date.now() < end; await sleep(50)) if (await test()) return;
  throw new Error(`it did not come in ${seconds} s. ${log().slice(-2_000)}`);
}

const isHealthy = (origin: string) =>
  new Promise<boolean>((done) => {
    const outgoing = request(`${origin}/api/v1/health`, (incoming) => {
      incoming.resume();
      done(incoming.statusCode === 200);
    });
    outgoing.on('error', () => done(false));
    outgoing.end();
  });

async function freePort(): Promise<number> {
  const server = createServer();
  await new Promise<void>((done) => server.listen(0, '127.0.0.1', () => done()));
  const address = server.address();
  await new Promise((done) => server.close(done));
  if (address === null || typeof address !== 'object') throw new Error('no port');
  return address.port;
}
