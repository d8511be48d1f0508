import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import {
  cookieHeaders,
  forgetRates,
  makeThings,
  makeWorkshop,
  origin,
  pool,
  send,
  sha256,
  type Things,
  type Workshop,
} from './security-kit.ts';

let here: Workshop;
let things: Things;
beforeEach(async () => {
  await forgetRates();
  here = await makeWorkshop();
  things = await makeThings(here.id, here.technician);
});
afterAll(() => pool.end());

const share = (body: unknown = {}) =>
  send('POST', `/api/v1/captures/${things.capture}/share-links`, { headers: here.technician.browser, body });
const shared = (secret: string, rest = '') => send('GET', `/api/v1/shared/${secret}${rest}`);
const answerTo = (secret: string, body: unknown, headers: Record<string, string> = { origin }) =>
  send('POST', `/api/v1/shared/${secret}/answers`, { headers, body });
const GOOD = { name: 'Kit', text: 'The reluctor has a bent tooth.' };
const DAY_MS = 86_400_000;

describe('making a link', () => {
  it('shows its address once; the database holds only the SHA-256 of its 256 bits; it ends after 14 days', async () => {
    const made = await share({ question: 'Which tooth?' });
    expect(made.status).toBe(201);
    const secret = made.json.url.replace(`${origin}/s/`, '');
    expect(secret).toMatch(/^[\w-]{43}$/);
    const { rows } = await pool.query('select secret_hash, expires_at from share_link where id = $1', [
      made.json.id,
    ]);
    expect(rows[0].secret_hash).toBe(sha256(secret));
    expect(Math.round((rows[0].expires_at.getTime() - Date.now()) / DAY_MS)).toBe(14);
    const list = await send('GET', `/api/v1/captures/${things.capture}/share-links`, {
      headers: here.owner.browser,
    });
    expect(list.json.items.map((item: { id: string }) => item.id)).toContain(made.json.id);
    expect(list.text).not.toContain(secret);
    expect(list.text).not.toContain(sha256(secret));
    expect((await shared(secret)).json.question).toBe('Which tooth?');
  });

  it('refuses an end in the past or more than a year away', async () => {
    for (const days of [-1, 400]) {
      const answer = await share({ expiresAt: new Date(Date.now() + days * DAY_MS).toISOString() });
      expect(answer.status).toBe(422);
    }
  });

  it('leaves a line in the audit list, without the secret', async () => {
    const made = await share();
    const audit = await send('GET', '/api/v1/audit', { headers: here.owner.browser });
    expect(audit.json.items[0]).toMatchObject({ action: 'link made', who: here.technician.name });
    expect(audit.text).not.toContain(made.json.url.split('/s/')[1]);
  });
});

describe('what a link shows', () => {
  it('is a listed projection: no workshop, file name, people, e-mail, job or ids of them', async () => {
    await pool.query("update capture set note = 'private note', job_id = $2 where id = $1", [
      things.capture,
      things.job,
    ]);
    const answer = await shared(things.answerSecret);
    expect(answer.status).toBe(200);
    expect(Object.keys(answer.json).sort()).toEqual(
      ['answers', 'capture', 'expiresAt', 'marks', 'mayAnswer', 'question', 'sharedBy', 'wheel'].sort(),
    );
    expect(Object.keys(answer.json.capture).sort()).toEqual(
      [
        'axis',
        'cylinders',
        'durationS',
        'sampleRateHz',
        'samples',
        'samplesVersion',
        'signals',
        'startS',
        'status',
        'title',
      ].sort(),
    );
    for (const secret of [
      'private',
      '@people.example',
      things.job,
      here.id,
      here.technician.id,
      things.capture,
    ])
      expect(answer.text, secret).not.toContain(secret);
  });

  it('names of the workshop’s people only who shared it', async () => {
    await pool.query(
      `insert into mark (id, capture_id, created_by, author, kind, from_s, text)
       values ($1, $2, $3, 'Test instructor', 'point', 0.9, 'second')`,
      [`${things.mark}x`, things.capture, here.instructor.id],
    );
    const { json, text } = await shared(things.answerSecret);
    expect(json.marks.map((mark: { author: string }) => mark.author)).toEqual([
      here.technician.name,
      'the workshop',
    ]);
    expect(text).not.toContain('Test instructor');
  });

  it('is this link’s answers, not those of another link of the same capture', async () => {
    await answerTo(things.answerSecret, {
      ...GOOD,
      mark: { kind: 'point', signal: 0, from: 0.3, to: null, value: null, text: 'm' },
    });
    expect((await shared(things.answerSecret)).text).toContain(GOOD.text);
    const look = await shared(things.lookSecret);
    expect(look.json.answers).toEqual([]);
    expect(look.json.marks).toHaveLength(1);
  });

  it('is not to be kept, indexed or told to others', async () => {
    for (const path of [`/s/${things.answerSecret}`, `/api/v1/shared/${things.answerSecret}`]) {
      const { headers } = await send('GET', path);
      expect(headers['cache-control'], path).toBe('no-store');
      expect(headers['x-robots-tag'], path).toContain('noindex');
      expect(headers['referrer-policy'], path).toBe('no-referrer');
    }
  });

  it('is the same with or without a cookie, and sets none', async () => {
    const plain = await shared(things.answerSecret);
    const signedIn = await send('GET', `/api/v1/shared/${things.answerSecret}`, {
      headers: here.owner.browser,
    });
    expect(signedIn.text).toBe(plain.text);
    const page = await send('GET', `/s/${things.answerSecret}`, { headers: here.owner.browser });
    expect(page.headers['set-cookie']).toBeUndefined();
    expect(page.text).not.toContain(here.owner.name);
  });

  it('reaches no other capture: the secret is no token and no session', async () => {
    const headers = { authorization: `Bearer ${things.answerSecret}` };
    expect((await send('GET', `/api/v1/captures/${things.capture}`, { headers })).status).toBe(401);
    const cookie = cookieHeaders(things.answerSecret);
    expect((await send('GET', `/api/v1/captures/${things.capture}`, { headers: cookie })).status).toBe(401);
  });
});

describe('a link that ends', () => {
  it('answers 410 with a sentence when withdrawn or over, 404 when it never was', async () => {
    const remove = await send('DELETE', `/api/v1/share-links/${things.shareLink}`, {
      headers: here.technician.browser,
    });
    expect(remove.status).toBe(204);
    const withdrawn = await shared(things.answerSecret);
    expect(withdrawn.status).toBe(410);
    expect(withdrawn.json.error).toMatchObject({ code: 'link_ended' });
    expect((await answerTo(things.answerSecret, GOOD)).status).toBe(410);
    await pool.query("update share_link set expires_at = now() - interval '1 second' where capture_id = $1", [
      things.capture,
    ]);
    expect((await shared(things.lookSecret)).status).toBe(410);
    expect((await shared('B'.repeat(43))).status).toBe(404);
    expect((await shared('short')).status).toBe(404);
    const rest = ['/measurements', '/window?from=0&to=1&columns=10'];
    for (const path of rest) expect((await shared(things.lookSecret, path)).status, path).toBe(410);
  });

  it('answers 410 while its capture is hidden, and opens again with it', async () => {
    await pool.query('update capture set deleted_at = now() where id = $1', [things.capture]);
    expect((await shared(things.answerSecret)).status).toBe(410);
    await pool.query('update capture set deleted_at = null where id = $1', [things.capture]);
    expect((await shared(things.answerSecret)).status).toBe(200);
  });
});

describe('answers', () => {
  it('reach the workshop with their mark, which says that it came through a link', async () => {
    const mark = { kind: 'level', signal: 1, from: 0.4, to: null, value: 4.2, text: 'too low' };
    const made = await answerTo(things.answerSecret, { ...GOOD, mark });
    expect(made.status).toBe(201);
    const { browser: headers } = here.technician;
    const list = await send('GET', `/api/v1/captures/${things.capture}/answers`, { headers });
    const mine = list.json.items.find((item: { id: string }) => item.id === made.json.id);
    expect(mine).toMatchObject({
      ...GOOD,
      shareLinkId: things.shareLink,
      mark: { ...mark, author: 'Kit', fromAnswer: true },
    });
  });

  it('are refused when empty, over 2,000 characters, without a name, or with half a mark', async () => {
    const path = async (body: unknown) => {
      const answer = await answerTo(things.answerSecret, body);
      expect(answer.status).toBe(422);
      return answer.json.error.details[0].path;
    };
    expect(await path({ ...GOOD, text: ' ' })).toBe('text');
    expect(await path({ ...GOOD, text: 'x'.repeat(2_001) })).toBe('text');
    expect(await path({ ...GOOD, name: '' })).toBe('name');
    const mark = { kind: 'point', signal: 9, from: 0, to: null, value: null, text: '' };
    expect(await path({ ...GOOD, mark })).toBe('mark.signal');
    expect(await path({ ...GOOD, mark: { ...mark, kind: 'range', signal: 0 } })).toBe('mark.to');
    const { rows } = await pool.query('select count(*)::int as n from answer where capture_id = $1', [
      things.capture,
    ]);
    expect(rows[0].n).toBe(1);
  });

  it('are not taken by a link for looking', async () => {
    expect((await answerTo(things.lookSecret, GOOD)).status).toBe(403);
  });

  it('are slowed after ten from one address on one link', async () => {
    const answers = [];
    for (let i = 0; i < 11; i += 1) answers.push(await answerTo(things.answerSecret, GOOD));
    expect(answers.map(({ status }) => status)).toEqual([...Array.from({ length: 10 }, () => 201), 429]);
    expect(Number(answers[10]?.headers['retry-after'])).toBeGreaterThan(0);
  });

  it('end at two hundred a link', async () => {
    await pool.query(
      `insert into answer (id, share_link_id, capture_id, name, text)
       select 'answer' || n || $1, $1, $2, 'N', 'T' from generate_series(1, 198) n`,
      [things.shareLink, things.capture],
    );
    expect((await answerTo(things.answerSecret, GOOD)).status).toBe(201);
    expect((await answerTo(things.answerSecret, GOOD)).status).toBe(409);
  });

  it('are hidden from link and list together with their mark', async () => {
    const mark = { kind: 'point', signal: 0, from: 0.4, to: null, value: null, text: 'm' };
    const made = await answerTo(things.answerSecret, { ...GOOD, mark });
    const { browser: headers } = here.technician;
    expect((await send('DELETE', `/api/v1/answers/${made.json.id}`, { headers })).status).toBe(204);
    const list = await send('GET', `/api/v1/captures/${things.capture}/answers`, { headers });
    expect(list.text).not.toContain(made.json.id);
    const view = await shared(things.answerSecret);
    expect(view.text).not.toContain(GOOD.text);
    expect(view.json.marks).toHaveLength(1);
  });

  it('come from our own page only when a browser sends them', async () => {
    expect((await answerTo(things.answerSecret, GOOD, { origin: 'https://elsewhere.example' })).status).toBe(
      403,
    );
    expect(
      (await answerTo(things.answerSecret, GOOD, { origin: 'null', 'sec-fetch-site': 'cross-site' })).status,
    ).toBe(403);
    // A page with no-referrer sends Origin: null for its own requests.
    expect(
      (await answerTo(things.answerSecret, GOOD, { origin: 'null', 'sec-fetch-site': 'same-origin' })).status,
    ).toBe(201);
  });
});

describe('looks', () => {
  it('count when the trace was drawn, not when the link is fetched, and not without end from one address', async () => {
    await shared(things.answerSecret);
    await send('GET', `/s/${things.answerSecret}`);
    const seen = async () =>
      (await pool.query('select seen from share_link where id = $1', [things.shareLink])).rows[0]
        .seen as number;
    expect(await seen()).toBe(0);
    const look = () => send('POST', `/api/v1/shared/${things.answerSecret}/seen`, { headers: { origin } });
    expect((await look()).status).toBe(204);
    expect(await seen()).toBe(1);
    for (let i = 0; i < 10; i += 1) expect((await look()).status).toBe(204);
    expect(await seen()).toBe(6);
  });
});
