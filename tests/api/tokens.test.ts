import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  bearer,
  cookieHeaders,
  join,
  makeToken,
  makeWorkshop,
  pool,
  send,
  sha256,
  type Workshop,
} from './security-kit.ts';

let here: Workshop;
beforeAll(async () => {
  here = await makeWorkshop();
});
afterAll(() => pool.end());

const make = (body: unknown, headers = here.owner.browser) =>
  send('POST', '/api/v1/tokens', { headers, body });
const DAY_MS = 86_400_000;

describe('POST /tokens', () => {
  it('shows the secret once and keeps only its SHA-256; it ends after 90 days unless said', async () => {
    const answer = await make({ name: 'bench', scopes: ['read'] });
    expect(answer.status).toBe(201);
    const { id, token, expiresAt } = answer.json;
    const { rows } = await pool.query('select hash, workshop_id from token where id = $1', [id]);
    expect(rows).toEqual([{ hash: sha256(token), workshop_id: here.id }]);
    const days = (Date.parse(expiresAt) - Date.now()) / DAY_MS;
    expect(Math.round(days)).toBe(90);
    const list = await send('GET', '/api/v1/tokens', { headers: here.owner.browser });
    expect(list.json.items.map((item: { id: string }) => item.id)).toContain(id);
    expect(list.text).not.toContain(token);
    expect(list.text).not.toContain(sha256(token));
  });

  it('refuses an end in the past or more than a year away, and an unknown scope', async () => {
    const at = (days: number) => new Date(Date.now() + days * DAY_MS).toISOString();
    expect((await make({ name: 'n', scopes: ['read'], expiresAt: at(-1) })).status).toBe(422);
    expect((await make({ name: 'n', scopes: ['read'], expiresAt: at(400) })).status).toBe(422);
    expect((await make({ name: 'n', scopes: ['everything'] })).status).toBe(422);
    expect((await make({ name: 'n', scopes: [] })).status).toBe(422);
  });

  it('is not for tokens, whatever their scopes', async () => {
    const token = await makeToken(here.owner, here.id, ['read', 'write', 'manage']);
    const headers = bearer(token);
    expect(
      (await send('POST', '/api/v1/tokens', { headers, body: { name: 'n', scopes: ['read'] } })).status,
    ).toBe(403);
    expect((await send('GET', '/api/v1/tokens', { headers })).status).toBe(403);
    expect((await send('POST', '/api/v1/sign-out', { headers })).status).toBe(403);
    expect(
      (await send('PUT', '/api/v1/me/workshop', { headers, body: { workshopId: here.id } })).status,
    ).toBe(403);
  });
});

describe('a token', () => {
  it('that has ended, was withdrawn or never was answers 401 and does not fall back to the cookie', async () => {
    const ended = await makeToken(here.owner, here.id, ['read'], -1);
    const made = await make({ name: 'n', scopes: ['read'] });
    await send('DELETE', `/api/v1/tokens/${made.json.id}`, { headers: here.owner.browser });
    for (const token of [ended, made.json.token, 'gapmark_nothing', '']) {
      const headers = { ...cookieHeaders(here.owner.sessionSecret), authorization: `Bearer ${token}` };
      expect((await send('GET', '/api/v1/me', { headers })).status).toBe(401);
    }
  });

  it('needs the scope of what it does, and manages nothing without manage', async () => {
    const headers = bearer(await makeToken(here.owner, here.id, ['read', 'write']));
    expect((await send('GET', '/api/v1/me', { headers })).status).toBe(200);
    const refused = await send('GET', '/api/v1/people', { headers });
    expect(refused.status).toBe(403);
    expect(refused.json.error.code).toBe('scope_too_low');
    const manage = bearer(await makeToken(here.owner, here.id, ['manage']));
    expect((await send('GET', '/api/v1/people', { headers: manage })).status).toBe(200);
  });

  it('never does more than its person may', async () => {
    const headers = bearer(await makeToken(here.technician, here.id, ['read', 'write', 'manage']));
    const refused = await send('GET', '/api/v1/people', { headers });
    expect(refused.status).toBe(403);
    expect(refused.json.error.code).toBe('role_too_low');
  });

  it('stays in its workshop when its person switches', async () => {
    const other = await makeWorkshop('Other');
    await join(here.owner, other.id, 'owner');
    const headers = bearer(await makeToken(here.owner, here.id, ['read']));
    await pool.query('update person set current_workshop_id = $2 where id = $1', [here.owner.id, other.id]);
    const me = await send('GET', '/api/v1/me', { headers });
    expect(me.json).toMatchObject({ via: 'token', workshop: { id: here.id } });
    expect(me.json.workshops).toHaveLength(1);
    await pool.query('update person set current_workshop_id = $2 where id = $1', [here.owner.id, here.id]);
  });

  it('may send four seconds’ worth of 50 requests at once', async () => {
    const headers = bearer(await makeToken(here.owner, here.id, ['read']));
    const answers: number[] = [];
    for (let round = 0; round < 4; round += 1) {
      const batch = await Promise.all(
        Array.from({ length: 50 }, () => send('GET', '/api/v1/me', { headers })),
      );
      answers.push(...batch.map(({ status }) => status));
    }
    expect(new Set(answers)).toEqual(new Set([200]));
  });
});

describe('DELETE /tokens/{id}', () => {
  it('ends one’s own only', async () => {
    const made = await make({ name: 'n', scopes: ['read'] });
    const path = `/api/v1/tokens/${made.json.id}`;
    expect((await send('DELETE', path, { headers: here.technician.browser })).status).toBe(404);
    expect((await send('GET', '/api/v1/me', { headers: bearer(made.json.token) })).status).toBe(200);
    expect((await send('DELETE', path, { headers: here.owner.browser })).status).toBe(204);
    expect((await send('GET', '/api/v1/me', { headers: bearer(made.json.token) })).status).toBe(401);
  });
});
