import { hash } from '@node-rs/argon2';
import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { totpCode } from '../../src/server/session/second-step/totp.ts';
import {
  cookieHeaders,
  forgetRatesOf,
  join,
  makePerson,
  makeWorkshop,
  origin,
  pool,
  type Sent,
  send as sendFrom,
} from './security-kit.ts';

const PASSWORD = 'a quiet afternoon';
const FROM = '127.0.0.3';
beforeEach(() => forgetRatesOf(FROM));
const send = (method: string, path: string, sent: Sent = {}) =>
  sendFrom(method, path, { ...sent, from: FROM });
afterAll(() => pool.end());

const post = (path: string, body: unknown, headers: Readonly<Record<string, string>> = { origin }) =>
  send('POST', `/api/v1${path}`, { headers, body });
const cookieNamed = (name: string, setCookie: string[] | undefined) =>
  (setCookie ?? []).map((line) => new RegExp(`^${name}=([^;]*)`).exec(line)?.[1]).find(Boolean) ?? '';
const session = (setCookie: string[] | undefined) => cookieNamed('gapmark', setCookie);

/** A person whose second step is on, the key of it, and the recovery codes. */
async function withSecondStep() {
  const shop = await makeWorkshop();
  const person = await makePerson('Two', await hash(PASSWORD, { memoryCost: 1024, timeCost: 1 }));
  await join(person, shop.id, 'technician');
  const begun = await post('/me/second-step', { password: PASSWORD }, person.browser);
  expect(begun.status).toBe(200);
  const { key, address } = begun.json as { key: string; address: string };
  // The step before this one, so that the present code is still unused.
  const code = totpCode(key, Date.now() - 30_000);
  const on = await post('/me/second-step/confirm', { code }, person.browser);
  expect(on.status, on.text).toBe(200);
  const browser = cookieHeaders(session(on.headers['set-cookie']));
  return { person, key, address, browser, recoveryCodes: on.json.recoveryCodes as string[] };
}

async function passwordStep(email: string) {
  const answer = await post('/sign-in', { email, password: PASSWORD });
  expect([answer.status, answer.json]).toEqual([200, { status: 'code_needed' }]);
  expect(session(answer.headers['set-cookie'])).toBe('');
  const step = cookieNamed('gapmark-step', answer.headers['set-cookie']);
  return { origin, cookie: `gapmark-step=${step}` };
}

const codeStep = (code: string, headers: Readonly<Record<string, string>>) =>
  post('/sign-in/code', { code }, headers);

describe('the second step', () => {
  it('is set up with a key and a first code, and then signing in takes a code, each once', async () => {
    const { person, key, address, browser } = await withSecondStep();
    expect(new URL(address).searchParams.get('secret')).toBe(key);
    expect((await send('GET', '/api/v1/me', { headers: browser })).status).toBe(200);
    // The session from before it was on has ended.
    expect((await send('GET', '/api/v1/me', { headers: person.browser })).status).toBe(401);
    const waiting = await passwordStep(person.email);
    expect((await send('GET', '/api/v1/me', { headers: waiting })).status).toBe(401);
    const code = totpCode(key, Date.now());
    const signedIn = await codeStep(code, waiting);
    expect(signedIn.status).toBe(200);
    const cookie = cookieHeaders(session(signedIn.headers['set-cookie']));
    expect((await send('GET', '/api/v1/me', { headers: cookie })).json.email).toBe(person.email);
    const again = await codeStep(code, await passwordStep(person.email));
    expect([again.status, again.json.error.code]).toEqual([401, 'wrong_code']);
  });

  it('takes a code once also when it comes twice at the same time', async () => {
    const { person, key } = await withSecondStep();
    const [one, two] = [await passwordStep(person.email), await passwordStep(person.email)];
    const code = totpCode(key, Date.now());
    const answers = await Promise.all([codeStep(code, one), codeStep(code, two)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 401]);
  });

  it('takes each recovery code once, however it is written, and keeps hashes only', async () => {
    const { person, recoveryCodes, browser } = await withSecondStep();
    expect(new Set(recoveryCodes).size).toBe(10);
    const [first = ''] = recoveryCodes;
    expect(first).toMatch(/^([a-z0-9]{5}-){3}[a-z0-9]{5}$/);
    const typed = first.toUpperCase().replaceAll('-', ' ');
    expect((await codeStep(typed, await passwordStep(person.email))).status).toBe(200);
    expect((await codeStep(first, await passwordStep(person.email))).status).toBe(401);
    const state = await send('GET', '/api/v1/me/second-step', { headers: browser });
    expect(state.json).toEqual({ on: true, recoveryCodesLeft: 9 });
    const { rows } = await pool.query('select hash from recovery_code where person_id = $1', [person.id]);
    expect(rows).toHaveLength(9);
    for (const row of rows) expect(row.hash).toMatch(/^[0-9a-f]{64}$/);
  });

  it('gives new recovery codes for the password, and the old ones end', async () => {
    const { person, recoveryCodes, browser } = await withSecondStep();
    const renewed = await post('/me/second-step/recovery-codes', { password: PASSWORD }, browser);
    expect(renewed.json.recoveryCodes).toHaveLength(10);
    expect((await codeStep(recoveryCodes[1] ?? '', await passwordStep(person.email))).status).toBe(401);
    expect((await codeStep(renewed.json.recoveryCodes[0], await passwordStep(person.email))).status).toBe(
      200,
    );
  });

  it('keeps the key sealed: neither base32 nor bytes of it lie in the database', async () => {
    const { person, key } = await withSecondStep();
    const { rows } = await pool.query(
      'select second_step::text as row from second_step where person_id = $1',
      [person.id],
    );
    expect(rows[0].row).not.toContain(key);
    expect(rows[0].row).not.toContain(key.slice(0, 12));
  });

  it('slows who tries codes, gives the password step six tries, and new passwords buy no new ones', async () => {
    const { person } = await withSecondStep();
    const waiting = await passwordStep(person.email);
    const statuses: number[] = [];
    for (let tries = 0; tries < 8; tries += 1) statuses.push((await codeStep('000000', waiting)).status);
    expect(statuses.slice(0, 5)).toEqual([401, 401, 401, 401, 401]);
    expect(statuses.slice(6)).toEqual([410, 410]);
    const fresh = await Promise.all(Array.from({ length: 4 }, () => passwordStep(person.email)));
    const more = await Promise.all(fresh.map((headers) => codeStep('000000', headers)));
    expect(more.filter(({ status }) => status === 429).length).toBeGreaterThanOrEqual(2);
  });

  it('is no way round the password: without its cookie, or with one that is too old, a code opens nothing', async () => {
    const { person, key } = await withSecondStep();
    const code = totpCode(key, Date.now());
    expect((await codeStep(code, { origin })).status).toBe(410);
    const waiting = await passwordStep(person.email);
    await pool.query(
      "update pending_sign_in set expires_at = now() - interval '1 second' where person_id = $1",
      [person.id],
    );
    expect((await codeStep(code, waiting)).status).toBe(410);
  });

  it('is ended with the password only, and signing in takes none again', async () => {
    const { person, browser } = await withSecondStep();
    expect((await post('/me/second-step/end', { password: 'guessed' }, browser)).status).toBe(422);
    expect((await post('/me/second-step/end', { password: PASSWORD }, browser)).status).toBe(204);
    const answer = await post('/sign-in', { email: person.email, password: PASSWORD });
    expect(answer.json.email).toBe(person.email);
  });

  it('cannot be replaced by another key while it is on', async () => {
    const { browser } = await withSecondStep();
    expect((await post('/me/second-step', { password: PASSWORD }, browser)).status).toBe(409);
  });
});
