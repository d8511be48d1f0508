import { hash } from '@node-rs/argon2';
import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { mailAbout, secretMailed } from '../kit/mailed-link.ts';
import {
  cookieHeaders,
  forgetRatesOf,
  join,
  makePerson,
  makeThings,
  makeToken,
  makeWorkshop,
  newId,
  newSecret,
  origin,
  type Person,
  pool,
  type Sent,
  send as sendFrom,
  sha256,
} from './security-kit.ts';

const PASSWORD = 'a quiet afternoon';
const FROM = '127.0.0.2';
beforeEach(() => forgetRatesOf(FROM));
const send = (method: string, path: string, sent: Sent = {}) =>
  sendFrom(method, path, { ...sent, from: FROM });
afterAll(() => pool.end());

const cheapHash = () => hash(PASSWORD, { memoryCost: 1024, timeCost: 1 });

async function makeAccount(role: 'owner' | 'technician' = 'technician') {
  const shop = await makeWorkshop();
  const person = await makePerson('Account', await cheapHash());
  await join(person, shop.id, role);
  return { ...person, shop };
}

const post = (path: string, body: unknown, headers: Readonly<Record<string, string>> = { origin }) =>
  send('POST', `/api/v1${path}`, { headers, body });
const signIn = (email: string, password: string) => post('/sign-in', { email, password });
const me = (headers: Readonly<Record<string, string>>) => send('GET', '/api/v1/me', { headers });
const cookieOf = (setCookie: string[] | undefined) =>
  /^gapmark=([^;]*)/.exec(setCookie?.[0] ?? '')?.[1] ?? '';

describe('a password reset', () => {
  it('mails a link in text and HTML that sets a new password once; every session ends', async () => {
    const person = await makeAccount();
    expect((await post('/password-resets', { email: person.email })).status).toBe(204);
    const mail = await mailAbout(person.email, /new password/);
    expect(mail.text).toContain(`${origin}/reset/new?key=`);
    expect(mail.html).toContain(`href="${origin}/reset/new?key=`);
    const secret = await secretMailed(person.email, /new password/, '/reset/new');
    const { rows } = await pool.query('select id from mailed_link where person_id = $1', [person.id]);
    expect(rows).toEqual([{ id: sha256(secret) }]);
    expect((await post('/password-resets/use', { secret, password: 'another one here' })).status).toBe(204);
    expect((await me(person.browser)).status).toBe(401);
    expect((await signIn(person.email, PASSWORD)).status).toBe(401);
    expect((await signIn(person.email, 'another one here')).status).toBe(200);
    const again = await post('/password-resets/use', { secret, password: 'a third one here' });
    expect(again.status).toBe(410);
    expect(again.json.error.message).toContain('used before');
    expect((await mailAbout(person.email, /password was set/)).text).toContain('If that was not you');
  });

  it('answers an unknown address as a known one, and sends nothing to it', async () => {
    const person = await makeAccount();
    const email = `${newId()}@people.example`;
    const [known, unknown] = [
      await post('/password-resets', { email: person.email }),
      await post('/password-resets', { email }),
    ];
    expect([unknown.status, unknown.text]).toEqual([known.status, known.text]);
    expect(Object.keys(unknown.headers).sort()).toEqual(Object.keys(known.headers).sort());
    const { rows } = await pool.query('select count(*)::int as n from mailed_link where email = $1', [email]);
    expect(rows[0].n).toBe(0);
  });

  it('sends an account three an hour and answers alike afterwards', async () => {
    const person = await makeAccount();
    for (let asked = 0; asked < 5; asked += 1)
      expect((await post('/password-resets', { email: person.email })).status).toBe(204);
    const { rows } = await pool.query('select count(*)::int as n from mailed_link where person_id = $1', [
      person.id,
    ]);
    expect(rows[0].n).toBe(3);
  });

  it('refuses a link whose time is over', async () => {
    const person = await makeAccount();
    await post('/password-resets', { email: person.email });
    const secret = await secretMailed(person.email, /new password/, '/reset/new');
    await pool.query("update mailed_link set expires_at = now() - interval '1 second' where person_id = $1", [
      person.id,
    ]);
    expect((await post('/password-resets/use', { secret, password: 'another one here' })).status).toBe(410);
    expect((await signIn(person.email, PASSWORD)).status).toBe(200);
  });
});

describe('PUT /me/password', () => {
  const put = (person: Person, current: string) =>
    send('PUT', '/api/v1/me/password', {
      headers: person.browser,
      body: { current, password: 'another one here' },
    });

  it('ends the other sessions and gives this browser a new one', async () => {
    const person = await makeAccount();
    const other = cookieOf((await signIn(person.email, PASSWORD)).headers['set-cookie']);
    const answer = await put(person, PASSWORD);
    expect(answer.status).toBe(204);
    const renewed = cookieOf(answer.headers['set-cookie']);
    expect(renewed).not.toBe(person.sessionSecret);
    expect((await me(cookieHeaders(renewed))).status).toBe(200);
    for (const ended of [other, person.sessionSecret])
      expect((await me(cookieHeaders(ended))).status).toBe(401);
  });

  it('needs the present password, and slows who tries it', async () => {
    const person = await makeAccount();
    for (let tries = 0; tries < 5; tries += 1) expect((await put(person, 'guessed')).status).toBe(422);
    const more = await Promise.all(Array.from({ length: 6 }, () => put(person, 'guessed')));
    expect(more.filter(({ status }) => status === 429).length).toBeGreaterThanOrEqual(3);
    expect((await me(person.browser)).status).toBe(200);
  });
});

describe('a change of address', () => {
  it('needs the password, is confirmed by a mail to the new address, ends the sessions and tells the old address', async () => {
    const person = await makeAccount();
    const email = `${newId()}@people.example`;
    expect((await post('/me/email', { email, password: 'guessed' }, person.browser)).status).toBe(422);
    expect((await post('/me/email', { email, password: PASSWORD }, person.browser)).status).toBe(204);
    expect((await me(person.browser)).json.email).toBe(person.email);
    const secret = await secretMailed(email, /Confirm your new address/, '/e-mail');
    const confirmed = await post('/me/email/confirm', { secret }, person.browser);
    expect(confirmed.status).toBe(204);
    expect((await me(person.browser)).status).toBe(401);
    const renewed = cookieHeaders(cookieOf(confirmed.headers['set-cookie']));
    expect((await me(renewed)).json.email).toBe(email);
    expect((await signIn(person.email, PASSWORD)).status).toBe(401);
    expect((await mailAbout(person.email, /address was changed/)).text).toContain('no longer signs in');
    expect((await post('/me/email/confirm', { secret })).status).toBe(410);
  });

  it('answers alike for an address that has an account, and mails its holder instead', async () => {
    const [person, known] = [await makeAccount(), await makeAccount()];
    const answer = await post('/me/email', { email: known.email, password: PASSWORD }, person.browser);
    expect(answer.status).toBe(204);
    expect((await mailAbout(known.email, /account already/)).text).not.toContain('key=');
  });
});

describe('sessions', () => {
  it('are listed with where they began, and end one by one or all others at once', async () => {
    const person = await makeAccount();
    await post('/sign-in', { email: person.email, password: PASSWORD }, { origin, 'user-agent': 'Bench 1' });
    await signIn(person.email, PASSWORD);
    const list = () => send('GET', '/api/v1/sessions', { headers: person.browser });
    const { json } = await list();
    expect(json.items).toHaveLength(3);
    expect(json.items.filter((one: { current: boolean }) => one.current)).toHaveLength(1);
    const bench = json.items.find((one: { agent: string }) => one.agent === 'Bench 1');
    expect(bench.address).toBe(FROM);
    const { rows } = await pool.query('select id from session where user_id = $1', [person.id]);
    for (const { id } of rows) expect(JSON.stringify(json)).not.toContain(id);
    const end = (id: string) => send('DELETE', `/api/v1/sessions/${id}`, { headers: person.browser });
    expect((await end(bench.id)).status).toBe(204);
    expect((await end(bench.id)).status).toBe(404);
    expect((await send('DELETE', '/api/v1/sessions', { headers: person.browser })).status).toBe(204);
    expect((await list()).json.items).toHaveLength(1);
    expect((await me(person.browser)).status).toBe(200);
  });

  it('of others cannot be ended', async () => {
    const [one, other] = [await makeAccount(), await makeAccount()];
    const { json } = await send('GET', '/api/v1/sessions', { headers: other.browser });
    const id = json.items[0].id;
    expect((await send('DELETE', `/api/v1/sessions/${id}`, { headers: one.browser })).status).toBe(404);
  });
});

describe('an invitation', () => {
  const invite = (owner: Person, email: string, role = 'technician') =>
    post('/invitations', { email, role }, owner.browser);
  const secretFor = (email: string) => secretMailed(email, /invites you/, '/invitation');
  const newcomer = { name: 'New', password: PASSWORD };

  it('mails a link that makes an account in the workshop with the role given, once', async () => {
    const shop = await makeWorkshop('Bench');
    const email = `${newId()}@people.example`;
    const made = await invite(shop.owner, email, 'instructor');
    expect(made.status).toBe(201);
    expect(made.json).toMatchObject({ email, role: 'instructor', url: null });
    const mail = await mailAbout(email, /invites you/);
    expect(mail.text).toContain('in "Bench" as an instructor');
    expect(mail.html).toContain(`href="${origin}/invitation?key=`);
    const secret = await secretFor(email);
    const { rows } = await pool.query('select secret_hash from invitation where id = $1', [made.json.id]);
    expect(rows[0].secret_hash).toBe(sha256(secret));
    const joined = await post('/invitations/accept', { secret, ...newcomer });
    expect(joined.status).toBe(201);
    expect(joined.json).toMatchObject({ email, role: 'instructor', workshop: { id: shop.id } });
    expect((await me(cookieHeaders(cookieOf(joined.headers['set-cookie'])))).json.email).toBe(email);
    const again = await post('/invitations/accept', { secret, ...newcomer });
    expect([again.status, again.json.error.message]).toEqual([
      410,
      'This invitation was used before. It works once.',
    ]);
  });

  it('makes one person of two that take it at the same time', async () => {
    const shop = await makeWorkshop();
    const email = `${newId()}@people.example`;
    await invite(shop.owner, email);
    const secret = await secretFor(email);
    const take = () => post('/invitations/accept', { secret, ...newcomer });
    const answers = await Promise.all([take(), take()]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 410]);
  });

  it('joins an account that exists after signing in, which is then in both workshops', async () => {
    const [person, shop] = [await makeAccount(), await makeWorkshop('Second')];
    await invite(shop.owner, person.email, 'learner');
    const secret = await secretFor(person.email);
    const without = await post('/invitations/accept', { secret, ...newcomer });
    expect([without.status, without.json.error.hint]).toEqual([
      409,
      'Sign in with it, then open the link again.',
    ]);
    const joined = await post('/invitations/accept', { secret }, person.browser);
    expect(joined.status).toBe(201);
    expect(joined.json.workshop.name).toBe('Second');
    expect(joined.json.workshops).toHaveLength(2);
    const back = { headers: person.browser, body: { workshopId: person.shop.id } };
    expect((await send('PUT', '/api/v1/me/workshop', back)).json.role).toBe('technician');
  });

  it('is refused for another address, after its end, and when it was withdrawn, each with its sentence', async () => {
    const [person, shop] = [await makeAccount(), await makeWorkshop()];
    const email = `${newId()}@people.example`;
    const { json } = await invite(shop.owner, email);
    const secret = await secretFor(email);
    const take = (headers?: Readonly<Record<string, string>>) =>
      post('/invitations/accept', { secret, ...newcomer }, headers);
    const other = await take(person.browser);
    expect(other.status).toBe(409);
    expect(other.json.error.message).toContain('another address');
    await pool.query("update invitation set expires_at = now() - interval '1 hour' where id = $1", [json.id]);
    const late = await take();
    expect([late.status, late.json.error.message]).toEqual([
      410,
      'This invitation has ended: it works for a week.',
    ]);
    await pool.query("update invitation set expires_at = now() + interval '1 hour' where id = $1", [json.id]);
    const path = `/api/v1/invitations/${json.id}`;
    expect((await send('DELETE', path, { headers: shop.owner.browser })).status).toBe(204);
    const withdrawn = await take();
    expect([withdrawn.status, withdrawn.json.error.message]).toEqual([410, 'This invitation was withdrawn.']);
    const unknown = await post('/invitations/accept', { secret: newSecret(), ...newcomer });
    expect(unknown.status).toBe(410);
  });

  it('replaces an earlier one of the same address, and is refused for who is there already', async () => {
    const shop = await makeWorkshop();
    const email = `${newId()}@people.example`;
    await invite(shop.owner, email, 'learner');
    await invite(shop.owner, email, 'technician');
    const { json } = await send('GET', '/api/v1/invitations', { headers: shop.owner.browser });
    expect(json.items).toMatchObject([{ email, role: 'technician' }]);
    expect((await invite(shop.owner, shop.learner.email)).status).toBe(409);
  });

  it('shows its page in words, to be taken with a form', async () => {
    const shop = await makeWorkshop('Bench & Co');
    const email = `${newId()}@people.example`;
    await invite(shop.owner, email);
    const secret = await secretFor(email);
    const page = await send('GET', `/invitation?key=${secret}`);
    expect(page.status).toBe(200);
    expect(page.text).toContain('Join Bench &amp; Co');
    const headers = { origin, 'content-type': 'application/x-www-form-urlencoded' };
    const body = new URLSearchParams({ secret, ...newcomer }).toString();
    const joined = await send('POST', `/invitation?_action=acceptInvitation&key=${secret}`, {
      headers,
      body,
    });
    expect([joined.status, joined.headers.location]).toEqual([303, '/captures']);
    expect((await send('GET', `/invitation?key=${secret}`)).text).toContain('used before');
  });
});

describe('leaving and removal', () => {
  const leave = (person: Person) => post('/me/leave', undefined, person.browser);

  it('take the person and their tokens out at once; what they made stays, signed', async () => {
    const shop = await makeWorkshop();
    const things = await makeThings(shop.id, shop.technician);
    const token = await makeToken(shop.technician, shop.id, ['read']);
    const path = `/api/v1/people/${shop.technician.id}`;
    expect((await send('DELETE', path, { headers: shop.owner.browser })).status).toBe(204);
    const as = { authorization: `Bearer ${token}` };
    expect((await me(as)).status).toBe(401);
    expect((await send('GET', '/api/v1/captures', { headers: shop.technician.browser })).status).toBe(401);
    const marks = await send('GET', `/api/v1/captures/${things.capture}/marks`, {
      headers: shop.owner.browser,
    });
    expect(marks.json.items[0].author).toBe(shop.technician.name);
    const audit = await send('GET', '/api/v1/audit', { headers: shop.owner.browser });
    expect(audit.json.items[0]).toMatchObject({ action: 'person removed', subject: shop.technician.name });
    expect((await send('DELETE', path, { headers: shop.owner.browser })).status).toBe(404);
  });

  it('are refused for the last owner, whoever asks', async () => {
    const shop = await makeWorkshop();
    expect((await leave(shop.owner)).status).toBe(409);
    const path = `/api/v1/people/${shop.owner.id}`;
    expect((await send('DELETE', path, { headers: shop.owner.browser })).status).toBe(409);
  });

  it('leave one owner when two leave at the same time', async () => {
    for (let round = 0; round < 3; round += 1) {
      const shop = await makeWorkshop();
      const second = await makePerson('Second owner');
      await join(second, shop.id, 'owner');
      const answers = await Promise.all([leave(shop.owner), leave(second)]);
      expect(answers.map(({ status }) => status).sort()).toEqual([204, 409]);
      const { rows } = await pool.query(
        "select count(*)::int as n from membership where workshop_id = $1 and role = 'owner'",
        [shop.id],
      );
      expect(rows[0].n).toBe(1);
    }
  });

  it('say to somebody who is in no workshop any more what to do', async () => {
    const person = await makeAccount();
    expect((await leave(person)).status).toBe(204);
    const refused = await signIn(person.email, PASSWORD);
    expect(refused.status).toBe(403);
    expect(refused.json.error.message).toContain('Ask an owner for an invitation');
  });
});

describe('POST /me/erase', () => {
  it('takes the person away and leaves what they made, signed with the name that they choose', async () => {
    const person = await makeAccount();
    const { shop } = person;
    const things = await makeThings(shop.id, person);
    await pool.query(
      "insert into audit (id, workshop_id, who, action, subject) values ($1, $2, 'x', 'invited', $3)",
      [newId(), shop.id, person.email],
    );
    expect((await post('/me/erase', { password: 'guessed' }, person.browser)).status).toBe(422);
    const body = { password: PASSWORD, name: 'A. from the bench' };
    expect((await post('/me/erase', body, person.browser)).status).toBe(204);
    expect((await me(person.browser)).status).toBe(401);
    const marks = await send('GET', `/api/v1/captures/${things.capture}/marks`, {
      headers: shop.owner.browser,
    });
    expect(marks.json.items[0].author).toBe('A. from the bench');
    const { rows } = await pool.query('select email, name, password_hash from person where id = $1', [
      person.id,
    ]);
    expect(rows[0].email).toMatch(/@erased\.invalid$/);
    expect(rows[0]).toMatchObject({ name: 'A. from the bench', password_hash: 'none' });
    const audit = await pool.query('select audit::text as line from audit where workshop_id = $1', [shop.id]);
    const lines = audit.rows.map((row: { line: string }) => row.line).join('\n');
    expect(lines).not.toContain(person.email);
    expect(lines).toContain('A. from the bench');
  });
});
