import { afterAll, describe, expect, it } from 'vitest';
import { join, makePerson, makeWorkshop, type Person, pool, send } from './security-kit.ts';

afterAll(() => pool.end());

const setRole = (by: Person, personId: string, role: string) =>
  send('PATCH', `/api/v1/people/${personId}`, { headers: by.browser, body: { role } });

describe('the workshop', () => {
  it('changes name and time zone for its owner, by edition', async () => {
    const shop = await makeWorkshop();
    const { browser: headers } = shop.owner;
    const before = await send('GET', '/api/v1/workshop', { headers });
    const body = { name: 'North yard', timeZone: 'Europe/Vienna' };
    const ifMatch = { ...headers, 'if-match': before.headers.etag ?? '' };
    const changed = await send('PATCH', '/api/v1/workshop', { headers: ifMatch, body });
    expect(changed.json).toMatchObject(body);
    expect((await send('PATCH', '/api/v1/workshop', { headers: ifMatch, body })).status).toBe(412);
  });

  it('takes no time zone that is not an IANA name', async () => {
    const shop = await makeWorkshop();
    const body = { timeZone: 'Middle/Nowhere' };
    expect((await send('PATCH', '/api/v1/workshop', { headers: shop.owner.browser, body })).status).toBe(422);
  });

  it('counts its own captures and bytes only', async () => {
    const shop = await makeWorkshop();
    const { json } = await send('GET', '/api/v1/workshop', { headers: shop.owner.browser });
    expect(json).toMatchObject({ captures: 0, storageBytes: 0 });
  });
});

describe('people', () => {
  it('are listed in pages that leave nobody out', async () => {
    const shop = await makeWorkshop();
    for (let i = 0; i < 3; i += 1) await join(await makePerson(`More ${i}`), shop.id, 'learner');
    const ids: string[] = [];
    let cursor = '';
    for (let turn = 0; turn < 10; turn += 1) {
      const path = `/api/v1/people?limit=2${cursor}`;
      const { json } = await send('GET', path, { headers: shop.owner.browser });
      ids.push(...json.items.map((item: { id: string }) => item.id));
      if (json.nextCursor === null) break;
      cursor = `&cursor=${encodeURIComponent(json.nextCursor)}`;
    }
    expect(ids).toHaveLength(7);
    expect(new Set(ids).size).toBe(7);
  });

  it('keep a last owner, also when two owners step down at the same time', async () => {
    const shop = await makeWorkshop();
    const alone = await setRole(shop.owner, shop.owner.id, 'technician');
    expect(alone.status).toBe(409);
    expect((await setRole(shop.owner, shop.instructor.id, 'owner')).status).toBe(200);
    const both = await Promise.all([
      setRole(shop.owner, shop.owner.id, 'technician'),
      setRole(shop.instructor, shop.instructor.id, 'technician'),
    ]);
    expect(both.map(({ status }) => status).sort()).toEqual([200, 409]);
    const { rows } = await pool.query(
      "select count(*)::int as n from membership where workshop_id = $1 and role = 'owner'",
      [shop.id],
    );
    expect(rows[0].n).toBe(1);
  });

  it('of another workshop do not exist', async () => {
    const [shop, other] = await Promise.all([makeWorkshop(), makeWorkshop()]);
    expect((await setRole(shop.owner, other.learner.id, 'owner')).status).toBe(404);
  });
});

describe('the audit list', () => {
  it('says who changed whose role, from where, newest first, and shows no other workshop’s lines', async () => {
    const [shop, other] = await Promise.all([makeWorkshop(), makeWorkshop()]);
    await setRole(other.owner, other.learner.id, 'technician');
    await setRole(shop.owner, shop.learner.id, 'technician');
    await setRole(shop.owner, shop.learner.id, 'learner');
    const { json } = await send('GET', '/api/v1/audit', { headers: shop.owner.browser });
    expect(json.items.map((item: { subject: string }) => item.subject)).toEqual([
      'Test learner: technician to learner',
      'Test learner: learner to technician',
    ]);
    expect(json.items[0]).toMatchObject({ who: 'Test owner', action: 'role changed' });
  });

  it('refuses a cursor that is not its own', async () => {
    const shop = await makeWorkshop();
    const foreign = Buffer.from(JSON.stringify(["1'); drop table audit; --", 'x'])).toString('base64url');
    for (const cursor of ['nonsense', foreign])
      expect(
        (await send('GET', `/api/v1/audit?cursor=${cursor}`, { headers: shop.owner.browser })).status,
      ).toBe(422);
  });
});
