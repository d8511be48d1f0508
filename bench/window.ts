import { fork } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import { Agent, createServer, request } from 'node:http';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import pg from 'pg';
import type * as TestCopy from '../scripts/lib/test-copy.mjs';

/**
 * Answers a second of the window endpoint against a bare Node handler that sends the same bytes, both in a process of their
 * own, asked by the same client over the same number of connections, in turn. "Same window": one that is asked for again,
 * as when several look at one capture. "Moving windows": each another stretch, as when somebody pans. The client's own work
 * is in both figures. Ratios count; the numbers beside them are this machine's.
 */
const ROUNDS = 5;
const ROUND_MS = 2_000;
const CONNECTIONS = 16;
const SAMPLES = 166_650;
const COLUMNS = 2_000;
/** The API's rate for one caller is 2,000 requests in ten seconds: the client goes on with another token before that. */
const USES_A_TOKEN = 1_900;
const TOKENS = 120;

if (process.argv[2] === 'bare') bareHandler();
else await main();

/** The yardstick: sends as many bytes as it is told, with the headers that a browser needs. */
function bareHandler(): void {
  const body = Buffer.alloc(Number(process.argv[3]), 7);
  const server = createServer((_request, response) => {
    response.writeHead(200, { 'Content-Type': 'application/octet-stream', 'Content-Length': body.length });
    response.end(body);
  });
  server.listen(0, '127.0.0.1', () => {
    const address = server.address();
    if (address !== null && typeof address === 'object') process.send?.(address.port);
  });
  process.on('disconnect', () => process.exit(0));
}

async function main(): Promise<void> {
  const running = process.env.GAPMARK_TEST_ORIGIN;
  const copy = running === undefined ? await startCopy() : null;
  const origin = running ?? copy?.env.GAPMARK_TEST_ORIGIN ?? '';
  const token = process.env.GAPMARK_TEST_TOKEN ?? copy?.env.GAPMARK_TEST_TOKEN ?? '';
  const headers = { authorization: `Bearer ${token}` };
  try {
    const callers = await tokens(process.env.DATABASE_URL ?? copy?.env.DATABASE_URL ?? '', token);
    let used = 0;
    const caller = () => callers[Math.floor(used++ / USES_A_TOKEN) % callers.length]!;
    const { id, v, endS } = await upload(origin, headers);
    const same = `${origin}/api/v1/captures/${id}/window?from=0&to=${endS}&columns=${COLUMNS}&v=${v}`;
    const bytes = (await (await fetch(same, { headers })).arrayBuffer()).byteLength;
    const bare = fork(process.argv[1]!, ['bare', String(bytes)]);
    const port = await new Promise<number>((done) => bare.once('message', (value) => done(Number(value))));
    let moved = 0;
    const moving = () => {
      moved = (moved + 1) % 4_000;
      return `${same}&signals=0,1,2,3`.replace('from=0', `from=${(moved / 4_000) * 0.2 * endS}`);
    };
    const kinds = { 'same window': () => same, 'moving windows': moving };
    for (const [name, urlOf] of Object.entries(kinds)) {
      const ratios: number[] = [];
      let last = '';
      for (let round = 0; round < ROUNDS; round += 1) {
        const yardstick = await rate(
          () => `http://127.0.0.1:${port}/`,
          () => ({}),
        );
        const ours = await rate(urlOf, caller);
        ratios.push(ours / yardstick);
        last = `${ours.toFixed(0)} against ${yardstick.toFixed(0)} answers a second of ${bytes} bytes`;
      }
      ratios.sort((a, b) => a - b);
      const [low, median, high] = [ratios[0]!, ratios[ROUNDS >> 1]!, ratios.at(-1)!];
      say(
        `${name}: ${median.toFixed(2)} × a bare handler (${low.toFixed(2)} to ${high.toFixed(2)}); last round ${last}`,
      );
    }
    bare.kill();
  } finally {
    await copy?.stop();
  }
}

/** A copy of its own, loaded where it lies: its scripts find each other by their place. */
async function startCopy() {
  const script = pathToFileURL(join(process.cwd(), 'scripts/lib/test-copy.mjs'));
  const { startTestCopy }: typeof TestCopy = await import(script.href);
  return startTestCopy(say);
}

async function upload(origin: string, headers: Record<string, string>) {
  const lines = ['Time (s),A (V),B (V),C (V),D (V)'];
  for (let i = 0; i < SAMPLES; i += 1) {
    const wave = [31.8, 15.9, 318, 7.95].map((period) => (5 * Math.sin(i / period)).toFixed(3));
    lines.push(`${(i / 50_000).toFixed(5)},${wave.join()}`);
  }
  const form = new FormData();
  form.append('file', new Blob([lines.join('\n')]), 'bench.csv');
  const made = await (
    await fetch(`${origin}/api/v1/captures`, { method: 'POST', headers, body: form })
  ).json();
  for (;;) {
    const capture = await (await fetch(`${origin}/api/v1/captures/${made.id}`, { headers })).json();
    if (capture.status === 'failed') throw new Error(capture.error.message);
    if (capture.status === 'ready')
      return {
        id: made.id as string,
        v: capture.samplesVersion as number,
        endS: capture.durationS as number,
      };
    await new Promise((done) => setTimeout(done, 200));
  }
}

/** More tokens of the same person, written straight into the copy's database. */
async function tokens(databaseUrl: string, like: string): Promise<Record<string, string>[]> {
  const sha256 = (text: string) => createHash('sha256').update(text).digest('hex');
  const client = new pg.Client({ connectionString: databaseUrl });
  await client.connect();
  const secrets = Array.from({ length: TOKENS }, () => `gapmark_${randomBytes(32).toString('base64url')}`);
  for (const secret of secrets) {
    await client.query(
      `insert into token (id, person_id, workshop_id, name, hash, scopes, expires_at)
       select substr($1, 1, 20), person_id, workshop_id, 'bench', $1, scopes, now() + interval '1 hour' from token where hash = $2`,
      [sha256(secret), sha256(like)],
    );
  }
  await client.end();
  return secrets.map((secret) => ({ authorization: `Bearer ${secret}` }));
}

/** Answers a second over a round, every connection asking anew as soon as it has its answer. */
async function rate(urlOf: () => string, headersOf: () => Record<string, string>): Promise<number> {
  const agent = new Agent({ keepAlive: true, maxSockets: CONNECTIONS });
  let answers = 0;
  const began = performance.now();
  const one = () =>
    new Promise<void>((done, fail) => {
      const outgoing = request(urlOf(), { agent, headers: headersOf() }, (incoming) => {
        if (incoming.statusCode !== 200) fail(new Error(`answered ${incoming.statusCode}`));
        incoming.resume();
        incoming.on('end', done);
      });
      outgoing.on('error', fail);
      outgoing.end();
    });
  const connection = async () => {
    while (performance.now() - began < ROUND_MS) {
      await one();
      answers += 1;
    }
  };
  await Promise.all(Array.from({ length: CONNECTIONS }, connection));
  const seconds = (performance.now() - began) / 1000;
  agent.destroy();
  return answers / seconds;
}

function say(line: string): void {
  process.stdout.write(`${line}\n`);
}
