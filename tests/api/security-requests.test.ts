import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  bearer,
  cookieHeaders,
  makeThings,
  makeToken,
  makeWorkshop,
  origin,
  pool,
  send,
  type Things,
  type Workshop,
} from './security-kit.ts';

let here: Workshop;
let things: Things;
beforeAll(async () => {
  here = await makeWorkshop();
  things = await makeThings(here.id, here.technician);
});
afterAll(() => pool.end());

const port = new URL(origin).port;
const cookieOnly = () => ({ cookie: cookieHeaders(here.technician.sessionSecret).cookie });
const mark = { kind: 'point', signal: 0, from: 0.1, to: null, value: null, text: 't' };
const post = (headers: Record<string, string>) =>
  send('POST', `/api/v1/captures/${things.capture}/marks`, { headers, body: mark });

describe('Host', () => {
  it.each([
    'evil.example',
    'evil.example:80',
    `127.0.0.1:${Number(port) + 1}`,
    'localhost',
    `127.0.0.1.evil.example:${port}`,
  ])('%s is 421, for pages, API and files', async (host) => {
    for (const path of ['/sign-in', '/api/v1/health', '/favicon.svg'])
      expect((await send('GET', path, { headers: { host } })).status, path).toBe(421);
  });

  it.each(['localhost', '127.0.0.1', '[::1]'])('%s with our port is answered on loopback', async (name) => {
    expect((await send('GET', '/api/v1/health', { headers: { host: `${name}:${port}` } })).status).toBe(200);
  });
});

describe('a request that changes something, by cookie', () => {
  it('passes with our own Origin', async () => {
    expect((await post({ ...cookieOnly(), origin })).status).toBe(201);
  });

  it.each(['https://elsewhere.example', 'http://127.0.0.1:1', 'http://localhost.evil.example', 'file://'])(
    'is 403 with the Origin %s',
    async (from) => {
      const answer = await post({ ...cookieOnly(), origin: from });
      expect(answer.status).toBe(403);
      expect(answer.json.error.code).toBe('wrong_origin');
    },
  );

  it('with another of our own names is held to that name', async () => {
    const host = `localhost:${port}`;
    expect((await post({ ...cookieOnly(), host, origin: `http://localhost:${port}` })).status).toBe(201);
    expect((await post({ ...cookieOnly(), host, origin: `http://127.0.0.1:${port}` })).status).toBe(403);
  });

  it('without Origin, or with null, passes only when the browser says same-origin', async () => {
    for (const base of [cookieOnly(), { ...cookieOnly(), origin: 'null' }]) {
      expect((await post(base)).status).toBe(403);
      expect((await post({ ...base, 'sec-fetch-site': 'cross-site' })).status).toBe(403);
      expect((await post({ ...base, 'sec-fetch-site': 'same-site' })).status).toBe(403);
      expect((await post({ ...base, 'sec-fetch-site': 'same-origin' })).status).toBe(201);
    }
  });

  it('needs JSON’s media type: a form or plain text is 415', async () => {
    for (const type of [
      'text/plain',
      'application/x-www-form-urlencoded',
      'multipart/form-data; boundary=x',
    ]) {
      const headers = { ...cookieOnly(), origin, 'content-type': type };
      const answer = await send('POST', `/api/v1/captures/${things.capture}/marks`, {
        headers,
        body: JSON.stringify(mark),
      });
      expect(answer.status, type).toBe(415);
    }
  });

  it('cannot sign a browser in from another site', async () => {
    const body = { email: 'a@people.example', password: 'x' };
    const headers = { origin: 'https://elsewhere.example' };
    expect((await send('POST', '/api/v1/sign-in', { headers, body })).status).toBe(403);
  });
});

describe('a request by token', () => {
  it('needs no Origin, and a foreign one does not matter, as no browser sends a token by itself', async () => {
    const headers = bearer(await makeToken(here.technician, here.id, ['write']));
    expect((await post(headers)).status).toBe(201);
    expect((await post({ ...headers, origin: 'https://elsewhere.example' })).status).toBe(201);
  });
});

describe('bodies', () => {
  const headers = () => ({ ...cookieOnly(), origin, 'content-type': 'application/json' });
  const path = () => `/api/v1/captures/${things.capture}/marks`;

  it('that are not JSON are 400, over 1 MiB 413, not UTF-8 400', async () => {
    expect((await send('POST', path(), { headers: headers(), body: '{"kind":' })).status).toBe(400);
    expect((await send('POST', path(), { headers: headers(), body: '' })).status).toBe(400);
    const large = JSON.stringify({ ...mark, text: 'x'.repeat(1024 * 1024) });
    expect((await send('POST', path(), { headers: headers(), body: large })).status).toBe(413);
  });

  it('with fields that need attention are 422 and name each', async () => {
    const answer = await send('POST', path(), { headers: headers(), body: JSON.stringify({ kind: 'blob' }) });
    expect(answer.status).toBe(422);
    expect(answer.json.error.code).toBe('invalid');
    expect(
      answer.json.error.details.every((d: { path: string; message: string }) => d.path && d.message),
    ).toBe(true);
  });

  it('do not reach prototypes', async () => {
    const body = `{"kind":"point","signal":0,"from":0.1,"to":null,"value":null,"text":"t","__proto__":{"polluted":true}}`;
    expect((await send('POST', path(), { headers: headers(), body })).status).toBe(201);
    expect((await send('GET', '/api/v1/me', { headers: headers() })).text).not.toContain('polluted');
  });
});

describe('every answer', () => {
  const paths = [
    '/',
    '/sign-in',
    '/captures',
    '/nothing',
    '/favicon.svg',
    '/api/v1/health',
    '/api/v1/nothing',
    '/api/v1/me',
  ];

  it.each(paths)('%s carries nosniff, Referrer-Policy and Permissions-Policy', async (path) => {
    const { headers } = await send('GET', path);
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['referrer-policy']).toBe('same-origin');
    expect(headers['permissions-policy']).toContain('camera=()');
  });

  it.each(['/', '/sign-in', '/sign-up'])(
    'page %s has a policy with hashes and nothing unsafe',
    async (path) => {
      const policy = (await send('GET', path)).headers['content-security-policy'];
      expect(policy).toContain("default-src 'self'");
      for (const part of [
        "object-src 'none'",
        "base-uri 'none'",
        "frame-ancestors 'none'",
        "form-action 'self'",
      ])
        expect(policy).toContain(part);
      expect(policy).toMatch(/script-src [^;]*'sha256-/);
      expect(policy).not.toContain('unsafe');
    },
  );

  it('that refuses has the catalogue’s shape and tells no stack, path or SQL', async () => {
    const tries = await Promise.all([
      send('GET', '/api/v1/nothing'),
      send('DELETE', '/api/v1/health'),
      send('GET', '/api/v1/captures?limit=many', { headers: cookieOnly() }),
      send('GET', '/api/v1/captures?search=%27;drop%20table%20x;--&cursor=%00', { headers: cookieOnly() }),
      send('GET', '/api/v1/captures?search=%00', { headers: cookieOnly() }),
      send('GET', '/api/v1/captures/%00', { headers: cookieOnly() }),
      send('POST', '/api/v1/captures/..%2f..%2fetc/marks', {
        headers: { ...cookieOnly(), origin },
        body: mark,
      }),
    ]);
    expect(tries.map(({ status }) => status)).toEqual([404, 405, 422, 422, 422, 404, 404]);
    for (const { json, text } of tries) {
      expect(json.error.code).toMatch(/^[a-z_]+$/);
      expect(text).not.toMatch(/node_modules|\bat \/|select |insert |\.ts:\d/i);
    }
  });
});

describe('forwarded headers', () => {
  it('are ignored without trusted proxies: the audit list has the socket’s address', async () => {
    const shop = await makeWorkshop();
    const own = await makeThings(shop.id, shop.owner);
    const headers = {
      ...shop.owner.browser,
      'x-forwarded-for': '203.0.113.9',
      'x-forwarded-host': 'evil.example',
      'x-forwarded-proto': 'https',
      forwarded: 'for=203.0.113.9;host=evil.example',
    };
    const made = await send('POST', `/api/v1/captures/${own.capture}/share-links`, { headers, body: {} });
    expect(made.json.url.startsWith(`${origin}/s/`)).toBe(true);
    const audit = await send('GET', '/api/v1/audit', { headers: shop.owner.browser });
    expect(audit.json.items[0].address).toMatch(/^(127\.0\.0\.1|::1)$/);
  });
});
