import { hash } from '@node-rs/argon2';
import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { confirmationLink, mailsTo } from '../kit/caught-mail.ts';
import {
  cookieHeaders,
  forgetRatesOf,
  join,
  makePerson,
  makeWorkshop,
  newId,
  origin,
  pool,
  type Sent,
  send as sendFrom,
  sha256,
} from './security-kit.ts';

const PASSWORD = 'a quiet afternoon';
const FROM = '127.0.0.6';
beforeEach(() => forgetRatesOf(FROM));
const send = (method: string, path: string, sent: Sent = {}) =>
  sendFrom(method, path, { ...sent, from: FROM });
afterAll(() => pool.end());

/** Cheap parameters: what is tested here is not the strength of this hash. */
async function makeAccount() {
  const shop = await makeWorkshop();
  const person = await makePerson('Account', await hash(PASSWORD, { memoryCost: 1024, timeCost: 1 }));
  await join(person, shop.id, 'technician');
  return person;
}

const signIn = (email: string, password: string, headers: Record<string, string> = { origin }) =>
  send('POST', '/api/v1/sign-in', { headers, body: { email, password } });

const cookieOf = (setCookie: string[] | undefined) =>
  /^gapmark=([^;]*)/.exec(setCookie?.[0] ?? '')?.[1] ?? '';

describe('POST /sign-up', () => {
  const fields = () => ({
    name: 'Ada',
    email: `${newId()}@people.example`,
    password: PASSWORD,
    workshop: 'Ada’s',
  });

  const ask = (body: unknown) => send('POST', '/api/v1/sign-up', { headers: { origin }, body });
  const confirm = (secret: string) =>
    send('POST', '/api/v1/sign-up/confirm', { headers: { origin }, body: { secret } });
  const secretFor = async (email: string) => (await confirmationLink(email)).searchParams.get('key') ?? '';

  it('mails a link that makes a person, their workshop with them as owner, and signs in', async () => {
    const body = fields();
    const asked = await ask(body);
    expect([asked.status, asked.json]).toEqual([201, { status: 'mail_sent' }]);
    expect(asked.headers['set-cookie']).toBeUndefined();
    const answer = await confirm(await secretFor(body.email));
    expect(answer.status).toBe(201);
    expect(answer.json).toMatchObject({ email: body.email, role: 'owner', workshop: { name: 'Ada’s' } });
    const me = await send('GET', '/api/v1/me', {
      headers: cookieHeaders(cookieOf(answer.headers['set-cookie'])),
    });
    expect(me.json.id).toBe(answer.json.id);
  });

  it('makes nothing before the link is used, and nothing again when it is used twice', async () => {
    const body = fields();
    await ask(body);
    const secret = await secretFor(body.email);
    const count = async () =>
      (await pool.query('select count(*)::int as n from person where email = $1', [body.email])).rows[0].n;
    expect(await count()).toBe(0);
    await confirm(secret);
    const again = await confirm(secret);
    expect([again.status, await count()]).toEqual([410, 1]);
    expect(again.json.error.message).toContain('used before');
  });

  it('answers a known address exactly as an unknown one, and mails its holder that there is an account', async () => {
    const known = await makeAccount();
    const unknown = await ask(fields());
    const answer = await ask({ ...fields(), email: known.email });
    expect([answer.status, answer.json]).toEqual([unknown.status, unknown.json]);
    expect(Object.keys(answer.headers).sort()).toEqual(Object.keys(unknown.headers).sort());
    const [mail] = await mailsTo(known.email);
    expect(mail?.subject).toBe('You have an account already');
    expect(mail?.text).not.toContain('key=');
  });

  it('keeps only the hash of the link’s secret', async () => {
    const body = fields();
    await ask(body);
    const secret = await secretFor(body.email);
    const { rows } = await pool.query('select id from pending_sign_up where email = $1', [body.email]);
    expect(rows).toEqual([{ id: sha256(secret) }]);
  });

  it('keeps the password as argon2id with 19 MiB, two passes and one lane', async () => {
    const body = fields();
    await ask(body);
    await confirm(await secretFor(body.email));
    const { rows } = await pool.query('select password_hash from person where email = $1', [body.email]);
    expect(rows[0].password_hash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
  });

  it('names each field that needs attention', async () => {
    const body = { name: ' ', email: 'no', password: 'short', workshop: '' };
    const answer = await send('POST', '/api/v1/sign-up', { headers: { origin }, body });
    expect(answer.status).toBe(422);
    const paths = answer.json.error.details.map((detail: { path: string }) => detail.path);
    expect(paths).toEqual(['name', 'email', 'password', 'workshop']);
  });

  it('makes one account of an address, whatever its case, also when two links are used at the same time', async () => {
    const body = fields();
    await ask(body);
    await ask({ ...body, email: body.email.toUpperCase() });
    let secrets: string[] = [];
    while (secrets.length < 2)
      secrets = (await mailsTo(body.email)).map(({ text }) => /key=(\S+)/.exec(text)?.[1] ?? '');
    const answers = await Promise.all(secrets.map(confirm));
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409]);
    const { rows } = await pool.query('select count(*)::int as n from person where email = $1', [body.email]);
    expect(rows[0].n).toBe(1);
  });
});

describe('POST /sign-in', () => {
  it('sets a cookie of 32 random bytes, HttpOnly and SameSite=Lax, of which the database keeps only the SHA-256', async () => {
    const person = await makeAccount();
    const answer = await signIn(person.email, PASSWORD);
    expect(answer.status).toBe(200);
    const [line = ''] = answer.headers['set-cookie'] ?? [];
    expect(line).toMatch(/^gapmark=[\w-]{43};/);
    expect(line).toContain('HttpOnly');
    expect(line).toContain('SameSite=Lax');
    expect(line).toContain('Path=/');
    expect(line).not.toContain('Secure'); // plain http on loopback
    const secret = cookieOf([line]);
    const { rows } = await pool.query('select user_id from session where id = $1', [sha256(secret)]);
    expect(rows).toEqual([{ user_id: person.id }]);
    const raw = await pool.query('select 1 from session where id = $1', [secret]);
    expect(raw.rowCount).toBe(0);
  });

  it('begins a new session and ends the one that this browser had', async () => {
    const person = await makeAccount();
    const answer = await signIn(person.email, PASSWORD, { ...person.browser });
    const secret = cookieOf(answer.headers['set-cookie']);
    expect(secret).not.toBe(person.sessionSecret);
    expect((await send('GET', '/api/v1/me', { headers: person.browser })).status).toBe(401);
    expect((await send('GET', '/api/v1/me', { headers: cookieHeaders(secret) })).status).toBe(200);
  });

  it('never takes over a cookie that was planted before', async () => {
    const person = await makeAccount();
    const planted = 'A'.repeat(43);
    await signIn(person.email, PASSWORD, cookieHeaders(planted));
    expect((await send('GET', '/api/v1/me', { headers: cookieHeaders(planted) })).status).toBe(401);
  });

  it('answers alike for an unknown address and a wrong password', async () => {
    const person = await makeAccount();
    const wrong = await signIn(person.email, 'not the password');
    const unknown = await signIn(`${newId()}@people.example`, 'not the password');
    expect([wrong.status, unknown.status]).toEqual([401, 401]);
    expect(unknown.text).toBe(wrong.text);
    const names = (headers: typeof wrong.headers) =>
      Object.keys(headers)
        .filter((name) => name !== 'date')
        .sort();
    expect(names(unknown.headers)).toEqual(names(wrong.headers));
  });

  it('slows tries at one account after five, tells how long to wait, and lets the right one in afterwards', async () => {
    const person = await makeAccount();
    for (let tries = 0; tries < 5; tries += 1) expect((await signIn(person.email, 'wrong')).status).toBe(401);
    expect((await signIn(person.email, 'wrong')).status).toBe(401);
    const refused = await signIn(person.email, PASSWORD);
    expect(refused.status).toBe(429);
    const wait = Number(refused.headers['retry-after']);
    expect(wait).toBeGreaterThanOrEqual(1);
    expect(wait).toBeLessThanOrEqual(2);
    // The delay ends by itself; here its end is brought about.
    await pool.query("delete from rate_limit where key like 'signin-account-gate:%'");
    expect((await signIn(person.email, PASSWORD)).status).toBe(200);
    expect((await signIn(person.email, 'wrong')).status).toBe(401);
  });

  it('lets no more through when many come at once', async () => {
    const person = await makeAccount();
    const answers = await Promise.all(Array.from({ length: 20 }, () => signIn(person.email, 'wrong')));
    expect(answers.filter(({ status }) => status === 401).length).toBeLessThanOrEqual(6);
    expect(answers.every(({ status }) => status === 401 || status === 429)).toBe(true);
  });

  it('counts failures by address too, and signing in to one’s own account buys no new tries', async () => {
    const own = await makeAccount();
    const strange = () => signIn(`${newId()}@people.example`, 'wrong');
    for (let tries = 0; tries < 30; tries += 1) {
      expect((await strange()).status).toBe(401);
      if (tries % 10 === 0) expect((await signIn(own.email, PASSWORD)).status).toBe(200);
    }
    expect((await strange()).status).toBe(401);
    expect((await strange()).status).toBe(429);
  });

  it('keeps no e-mail address among the counts', async () => {
    const person = await makeAccount();
    await signIn(person.email, 'wrong');
    const { rows } = await pool.query('select key from rate_limit');
    expect(rows.length).toBeGreaterThan(0);
    expect(JSON.stringify(rows)).not.toContain('@');
  });
});

describe('POST /sign-out', () => {
  it('ends the session in the database and clears the cookie', async () => {
    const person = await makeAccount();
    const answer = await send('POST', '/api/v1/sign-out', { headers: person.browser });
    expect(answer.status).toBe(204);
    expect(answer.headers['set-cookie']?.[0]).toMatch(/^gapmark=; .*Max-Age=0/);
    expect((await send('GET', '/api/v1/me', { headers: person.browser })).status).toBe(401);
    const { rowCount } = await pool.query('select 1 from session where user_id = $1', [person.id]);
    expect(rowCount).toBe(0);
  });
});

describe('a session', () => {
  it('that has ended opens nothing', async () => {
    const person = await makeAccount();
    await pool.query("update session set expires_at = now() - interval '1 second' where user_id = $1", [
      person.id,
    ]);
    expect((await send('GET', '/api/v1/me', { headers: person.browser })).status).toBe(401);
  });

  it('goes on from half-way when it is used', async () => {
    const person = await makeAccount();
    await pool.query("update session set expires_at = now() + interval '10 days' where user_id = $1", [
      person.id,
    ]);
    await send('GET', '/api/v1/me', { headers: person.browser });
    const { rows } = await pool.query(
      "select expires_at > now() + interval '29 days' as longer from session where user_id = $1",
      [person.id],
    );
    expect(rows[0].longer).toBe(true);
  });

  it('switches among the person’s own workshops only', async () => {
    const person = await makeAccount();
    const [mine, strange] = await Promise.all([makeWorkshop('Mine too'), makeWorkshop('Strange')]);
    await join(person, mine.id, 'instructor');
    const to = (workshopId: string) =>
      send('PUT', '/api/v1/me/workshop', { headers: person.browser, body: { workshopId } });
    const there = await to(mine.id);
    expect(there.json).toMatchObject({ role: 'instructor', workshop: { name: 'Mine too' } });
    expect((await to(strange.id)).status).toBe(404);
  });
});
