import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  bearer,
  join,
  makeThings,
  makeToken,
  makeWorkshop,
  pool,
  send,
  type Things,
  type Workshop,
} from './security-kit.ts';

/** Things open by id with the role held in their own workshop; what a person may not see does not exist for them. */
let here: Workshop;
let things: Things;

beforeAll(async () => {
  here = await makeWorkshop();
});
beforeEach(async () => {
  things = await makeThings(here.id, here.technician);
});
afterAll(() => pool.end());

const get = (path: string, headers: Readonly<Record<string, string>>) =>
  send('GET', `/api/v1${path}`, { headers });

describe('a capture by id', () => {
  it('opens in another workshop of the same person, whichever is the current one', async () => {
    const other = await makeWorkshop('Other');
    const theirs = await makeThings(other.id, other.owner);
    expect((await get(`/captures/${theirs.capture}`, here.technician.browser)).status).toBe(404);
    await join(here.technician, other.id, 'technician');
    const answer = await get(`/captures/${theirs.capture}`, here.technician.browser);
    expect(answer.status).toBe(200);
    expect(answer.json.workshopId).toBe(other.id);
    const list = await get('/captures', here.technician.browser);
    expect(list.json.items.map((item: { workshopId: string }) => item.workshopId)).not.toContain(other.id);
  });

  it('is judged by the role held in its workshop, not by the current one', async () => {
    const other = await makeWorkshop('Other');
    const theirs = await makeThings(other.id, other.owner);
    await join(here.owner, other.id, 'learner');
    expect((await get(`/captures/${theirs.capture}`, here.owner.browser)).status).toBe(404);
    expect((await get(`/known-goods/${theirs.knownGood}`, here.owner.browser)).status).toBe(403);
  });

  it('stays closed to a token of another workshop of the same person', async () => {
    const other = await makeWorkshop('Other');
    const theirs = await makeThings(other.id, other.owner);
    await join(here.owner, other.id, 'owner');
    const token = await makeToken(here.owner, here.id, ['read']);
    expect((await get(`/captures/${theirs.capture}`, here.owner.browser)).status).toBe(200);
    expect((await get(`/captures/${theirs.capture}`, bearer(token))).status).toBe(404);
  });

  it('answers alike for an id of another workshop, one that does not exist and one that cannot be an id', async () => {
    const other = await makeWorkshop('Other');
    const theirs = await makeThings(other.id, other.owner);
    const answers = await Promise.all(
      [theirs.capture, 'aaaaaaaaaaaaaaaaaaaa', "x'%20or%201=1"].map((id) =>
        get(`/captures/${id}`, here.owner.browser),
      ),
    );
    expect(answers.map(({ status }) => status)).toEqual([404, 404, 404]);
    expect(new Set(answers.map(({ text }) => text)).size).toBe(1);
  });

  it('is deleted by a technician only when it is their own: 403 otherwise', async () => {
    const ofOwner = await makeThings(here.id, here.owner);
    const remove = (id: string) =>
      send('DELETE', `/api/v1/captures/${id}`, { headers: here.technician.browser });
    expect((await remove(ofOwner.capture)).status).toBe(403);
    expect((await remove(things.capture)).status).toBe(204);
    expect((await get(`/captures/${things.capture}`, here.owner.browser)).status).toBe(404);
    const back = await send('POST', `/api/v1/captures/${things.capture}/restore`, {
      headers: here.technician.browser,
    });
    expect(back.status).toBe(200);
    expect((await get(`/captures/${things.capture}`, here.owner.browser)).status).toBe(200);
  });

  it('cannot be brought back after 30 days', async () => {
    await pool.query("update capture set deleted_at = now() - interval '31 days' where id = $1", [
      things.capture,
    ]);
    const back = await send('POST', `/api/v1/captures/${things.capture}/restore`, {
      headers: here.owner.browser,
    });
    expect(back.status).toBe(404);
  });

  it('takes its marks, links, answers and comparisons along when it is hidden', async () => {
    await pool.query('update capture set deleted_at = now() where id = $1', [things.capture]);
    const { browser: headers } = here.owner;
    expect((await get(`/captures/${things.capture}/marks`, headers)).status).toBe(404);
    expect(
      (await send('PATCH', `/api/v1/marks/${things.mark}`, { headers, body: { text: 'x' } })).status,
    ).toBe(404);
    expect((await send('DELETE', `/api/v1/share-links/${things.shareLink}`, { headers })).status).toBe(404);
    expect((await send('DELETE', `/api/v1/answers/${things.answer}`, { headers })).status).toBe(404);
    expect((await get(`/comparisons/${things.comparison}`, headers)).status).toBe(404);
  });
});

describe('a learner’s practice capture', () => {
  it('is seen by its maker, instructors and owners, not by technicians or other learners', async () => {
    const practice = await makeThings(here.id, here.learner, { practice: true });
    const second = await makeWorkshop();
    await join(second.learner, here.id, 'learner');
    const status = async (headers: Readonly<Record<string, string>>) =>
      (await get(`/captures/${practice.capture}`, headers)).status;
    expect(await status(here.learner.browser)).toBe(200);
    expect(await status(here.instructor.browser)).toBe(200);
    expect(await status(here.owner.browser)).toBe(200);
    expect(await status(here.technician.browser)).toBe(404);
    expect(await status(second.learner.browser)).toBe(404);
    const listed = await get('/captures?limit=100', here.technician.browser);
    expect(listed.text).not.toContain(practice.capture);
    const own = await get('/captures?limit=100', here.learner.browser);
    expect(own.json.items.map((item: { id: string }) => item.id)).toEqual([practice.capture]);
  });

  it('is marked, shared and deleted by its maker', async () => {
    const practice = await makeThings(here.id, here.learner, { practice: true });
    const { browser: headers } = here.learner;
    const mark = { kind: 'point', signal: 0, from: 0.2, to: null, value: null, text: 'mine' };
    const made = await send('POST', `/api/v1/captures/${practice.capture}/marks`, { headers, body: mark });
    expect(made.status).toBe(201);
    expect(
      (await send('POST', `/api/v1/captures/${practice.capture}/share-links`, { headers, body: {} })).status,
    ).toBe(201);
    expect((await send('DELETE', `/api/v1/captures/${practice.capture}`, { headers })).status).toBe(204);
  });
});

describe('a change of role', () => {
  it('counts from the next request on, for sessions and tokens', async () => {
    const shop = await makeWorkshop();
    const token = await makeToken(shop.technician, shop.id, ['read', 'write']);
    expect((await get('/known-goods', shop.technician.browser)).status).toBe(200);
    expect((await get('/known-goods', bearer(token))).status).toBe(200);
    const path = `/api/v1/people/${shop.technician.id}`;
    const changed = await send('PATCH', path, { headers: shop.owner.browser, body: { role: 'learner' } });
    expect(changed.status).toBe(200);
    expect((await get('/known-goods', shop.technician.browser)).status).toBe(403);
    expect((await get('/known-goods', bearer(token))).status).toBe(403);
  });

  it('closes everything to a person whose membership ends', async () => {
    const shop = await makeWorkshop();
    await pool.query('delete from membership where person_id = $1', [shop.technician.id]);
    expect((await get('/me', shop.technician.browser)).status).toBe(401);
  });
});
