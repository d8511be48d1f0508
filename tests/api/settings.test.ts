import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { createServer } from 'node:net';
import { resolve } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { hash } from '@node-rs/argon2';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { mailAbout, secretMailed } from '../kit/mailed-link.ts';
import { forgetRatesOf, join, makePerson, makeWorkshop, newId, pool, send, sha256 } from './security-kit.ts';

/** One more web process on the same database, set as behind an https address and for invited people only. */
const FROM = '127.0.0.4';
const HOST = 'gapmark.example';
const ORIGIN = `https://${HOST}`;
const PASSWORD = 'a quiet afternoon';
let web: ChildProcess;
let address = '';

async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const found = server.address();
  server.close();
  return typeof found === 'object' && found !== null ? found.port : 0;
}

beforeAll(async () => {
  const root = resolve(import.meta.dirname, '../..');
  const dist = resolve(root, process.env.GAPMARK_DIST ?? 'dist');
  const port = await freePort();
  const product = JSON.parse(process.env.GAPMARK_TEST_PRODUCT_ENV ?? '{}');
  const env = { ...product, PORT: String(port), GAPMARK_ORIGIN: ORIGIN, GAPMARK_SIGNUP: 'invite' };
  web = spawn(process.execPath, [`${dist}/entry/main.js`], { cwd: root, env, stdio: 'ignore' });
  address = `http://127.0.0.1:${port}`;
  for (let tries = 0; tries < 600; tries += 1, await sleep(100)) {
    if (
      await fetch(`${address}/api/v1/health`).then(
        (answer) => answer.ok,
        () => false,
      )
    )
      return;
  }
  throw new Error('the web process did not answer');
}, 120_000);
afterAll(async () => {
  const gone = once(web, 'exit');
  web.kill('SIGTERM');
  await gone;
  await pool.end();
});

/** A request as a proxy in front passes it on. */
const ask = (method: string, path: string, body?: unknown, headers: Record<string, string> = {}) =>
  send(method, new URL(path, address).href, {
    from: FROM,
    body,
    headers: { host: HOST, ...(method === 'GET' ? {} : { origin: ORIGIN }), ...headers },
  });

describe('with an https origin', () => {
  it('the session’s cookie is Secure, HttpOnly and bound to this host by its name', async () => {
    await forgetRatesOf(FROM);
    const shop = await makeWorkshop();
    const person = await makePerson('Secure', await hash(PASSWORD, { memoryCost: 1024, timeCost: 1 }));
    await join(person, shop.id, 'technician');
    const answer = await ask('POST', '/api/v1/sign-in', { email: person.email, password: PASSWORD });
    expect(answer.status).toBe(200);
    const [cookie = ''] = answer.headers['set-cookie'] ?? [];
    expect(cookie).toMatch(/^__Host-gapmark=[\w-]{43};/);
    for (const flag of ['Secure', 'HttpOnly', 'SameSite=Lax', 'Path=/']) expect(cookie).toContain(flag);
    expect(cookie).not.toMatch(/domain/i);
    const secret = /^__Host-gapmark=([^;]+)/.exec(cookie)?.[1] ?? '';
    const me = (name: string) => ask('GET', '/api/v1/me', undefined, { cookie: `${name}=${secret}` });
    expect((await me('__Host-gapmark')).json.email).toBe(person.email);
    // A cookie without the prefix could have been set by a neighbour of the host.
    expect((await me('gapmark')).status).toBe(401);
    expect((await pool.query('select 1 from session where id = $1', [sha256(secret)])).rowCount).toBe(1);
    expect(answer.headers['strict-transport-security']).toContain('max-age');
  });

  it('links in mail begin with the origin that is set, whatever host was asked', async () => {
    await forgetRatesOf(FROM);
    const shop = await makeWorkshop();
    const email = shop.technician.email;
    const headers = { host: new URL(address).host, origin: address, 'x-forwarded-host': 'evil.example' };
    const answer = await ask('POST', '/api/v1/password-resets', { email }, headers);
    expect(answer.status, answer.text).toBe(204);
    const mail = await mailAbout(email, /new password/);
    expect(mail.text).toContain(`${ORIGIN}/reset/new?key=`);
    expect(mail.html).toContain(`"${ORIGIN}/reset/new?key=`);
    expect(`${mail.text}${mail.html}`).not.toMatch(/evil|127\.0\.0\.1/);
  });
});

describe('with GAPMARK_SIGNUP=invite', () => {
  const fields = (email: string) => ({ name: 'Ada', email, password: PASSWORD, workshop: 'Ada’s' });

  it('nobody signs up by themselves, by API or form', async () => {
    const email = `${newId()}@people.example`;
    const refused = await ask('POST', '/api/v1/sign-up', fields(email));
    expect([refused.status, refused.json.error.code]).toEqual([403, 'sign_up_closed']);
    const page = await ask('GET', '/sign-up');
    expect(page.text).toContain('By invitation only');
    const { rowCount } = await pool.query('select 1 from pending_sign_up where email = $1', [email]);
    expect(rowCount).toBe(0);
  });

  it('an invitation still makes an account', async () => {
    await forgetRatesOf(FROM);
    const shop = await makeWorkshop();
    const email = `${newId()}@people.example`;
    const cookie = `__Host-gapmark=${shop.owner.sessionSecret}`;
    const made = await ask('POST', '/api/v1/invitations', { email, role: 'learner' }, { cookie });
    expect(made.status).toBe(201);
    const secret = await secretMailed(email, /invites you/, '/invitation');
    const joined = await ask('POST', '/api/v1/invitations/accept', {
      secret,
      name: 'New',
      password: PASSWORD,
    });
    expect(joined.json).toMatchObject({ email, role: 'learner' });
    expect(joined.headers['set-cookie']?.[0]).toMatch(/^__Host-gapmark=/);
  });
});
