import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { PAGES } from '../../src/contract/pages.ts';
import { ACCESS } from '../../src/contract/roles.ts';
import { makeThings, makeWorkshop, origin, pool, send, type Things, type Workshop } from './security-kit.ts';

let here: Workshop;
let things: Things;

beforeAll(async () => {
  here = await makeWorkshop();
  things = await makeThings(here.id, here.technician);
});
afterAll(() => pool.end());

const addressOf = (path: string) =>
  path
    .replace('/comparisons/{id}', `/comparisons/${things.comparison}`)
    .replace('/jobs/{id}', `/jobs/${things.job}`)
    .replace('/library/{id}', `/library/${things.knownGood}`)
    .replace('/teaching/exercises/{id}', `/teaching/exercises/${things.exercise}`)
    .replace('/teaching/sets/{id}', `/teaching/sets/${things.set}`)
    .replace('{id}', things.capture)
    .replace('{secret}', things.answerSecret);

const ERROR_PAGES = ['/404', '/500', '/refused'];
const pages = Object.entries(PAGES).filter(([path]) => !ERROR_PAGES.includes(path));
const ROLES = ['owner', 'instructor', 'technician', 'learner'] as const;

describe.each(pages)('page %s (%s)', (path, access) => {
  const row = ACCESS[access];
  const byLink = row.share !== 'no';

  it('sends a caller who is nobody to sign in, unless it is open or opened by a link', async () => {
    const answer = await send('GET', addressOf(path));
    if (row.nobody || byLink) return expect(answer.status).toBe(200);
    expect(answer.status).toBe(303);
    expect(answer.headers.location).toBe(`/sign-in?next=${encodeURIComponent(addressOf(path))}`);
    expect(answer.text).toBe('');
  });

  it.each(ROLES)('opens to the %s as the table says', async (role) => {
    const answer = await send('GET', addressOf(path), { headers: here[role].browser });
    if (byLink) return expect(answer.status).toBe(200);
    if (row[role] === 'yes' || row.nobody) return expect([200, 302, 303]).toContain(answer.status);
    // A thing that is not theirs does not exist for a learner; a place without part for them says so.
    const there = path.startsWith('/library') || path.startsWith('/teaching');
    const refused = path.includes('{id}') && !there ? [404] : [403];
    if ((row[role] === 'own' || row[role] === 'set') && !path.includes('{id}'))
      return expect(answer.status).toBe(200);
    expect(refused).toContain(answer.status);
    expect(answer.text).not.toContain('Crank and cam');
  });
});

describe('pages', () => {
  it('give 404 for an address that no page has', async () => {
    const answer = await send('GET', '/nothing/here', { headers: here.owner.browser });
    expect(answer.status).toBe(404);
  });

  it('give 404 for a thing of another workshop', async () => {
    const other = await makeWorkshop();
    expect((await send('GET', `/captures/${things.capture}`, { headers: other.owner.browser })).status).toBe(
      404,
    );
  });

  it('give 410 with a sentence for a link that was withdrawn, and 404 for one that never was', async () => {
    const gone = await makeThings(here.id, here.technician);
    await pool.query('update share_link set withdrawn_at = now() where capture_id = $1', [gone.capture]);
    const withdrawn = await send('GET', `/s/${gone.answerSecret}`);
    expect(withdrawn.status).toBe(410);
    expect(withdrawn.text).toContain('withdrawn');
    expect((await send('GET', `/s/${'A'.repeat(43)}`)).status).toBe(404);
    expect((await send('GET', '/s/short')).status).toBe(404);
  });

  it('write what users typed as text, never as markup', async () => {
    const typed = '"><script>alert(1)</script>';
    const shop = await makeWorkshop(typed);
    const own = await makeThings(shop.id, shop.owner);
    await pool.query('update capture set title = $2, note = $2 where id = $1', [own.capture, typed]);
    for (const path of ['/captures', `/captures/${own.capture}`, '/workshop', `/s/${own.answerSecret}`]) {
      const { text } = await send('GET', path, { headers: shop.owner.browser });
      expect(text.includes(typed), path).toBe(false);
    }
  });
});

describe('forms', () => {
  const form = (fields: Record<string, string>) => new URLSearchParams(fields).toString();
  const typed = { 'content-type': 'application/x-www-form-urlencoded' };

  it('are not run when they come from another site, whatever page they are sent to', async () => {
    const headers = { ...here.owner.browser, ...typed, origin: 'https://elsewhere.example' };
    for (const path of ['/workshop', '/', '/sign-in', '/refused', '/404']) {
      const body = form({ name: 'Taken over', timeZone: 'Etc/UTC' });
      const answer = await send('POST', `${path}?_action=patchWorkshop`, { headers, body });
      expect(answer.status, path).toBe(403);
    }
    const { rows } = await pool.query('select name from workshop where id = $1', [here.id]);
    expect(rows[0].name).toBe('Test workshop');
  });

  it('are not run for a role that may not, nor through an API address or the call address', async () => {
    const body = form({ name: 'Taken over', timeZone: 'Etc/UTC' });
    for (const person of [here.instructor, here.technician, here.learner]) {
      const headers = { ...person.browser, ...typed };
      expect((await send('POST', '/captures?_action=patchWorkshop', { headers, body })).status).toBe(403);
      expect((await send('POST', '/_actions/patchWorkshop', { headers, body })).status).toBe(403);
    }
    const owner = { ...here.owner.browser, ...typed };
    expect(
      (await send('POST', '/api/v1/health?_action=patchWorkshop', { headers: owner, body })).status,
    ).toBe(404);
    expect((await send('POST', '/_actions/nothing', { headers: owner, body })).status).toBe(404);
    const nobody = { origin, ...typed };
    expect((await send('POST', '/workshop?_action=patchWorkshop', { headers: nobody, body })).status).toBe(
      303,
    );
    const { rows } = await pool.query('select name from workshop where id = $1', [here.id]);
    expect(rows[0].name).toBe('Test workshop');
  });

  it('work without script and are followed by a page', async () => {
    const shop = await makeWorkshop();
    const body = form({ name: 'Renamed', timeZone: 'Europe/Vienna' });
    const headers = { ...shop.owner.browser, ...typed };
    const answer = await send('POST', '/workshop?_action=patchWorkshop', { headers, body });
    expect(answer.status).toBe(303);
    expect(answer.headers.location).toBe('/workshop');
    const { rows } = await pool.query('select name from workshop where id = $1', [shop.id]);
    expect(rows[0].name).toBe('Renamed');
  });

  it('take an answer on a link’s page, and none where the link is for looking only', async () => {
    const body = form({ name: 'Kit', text: 'Looks like the reluctor.' });
    const headers = { origin: 'null', 'sec-fetch-site': 'same-origin', ...typed };
    const answer = await send('POST', `/s/${things.answerSecret}?_action=answerShared`, { headers, body });
    expect(answer.status).toBe(303);
    const look = await send('POST', `/s/${things.lookSecret}?_action=answerShared`, { headers, body });
    expect(look.status).toBe(403);
    const { rows } = await pool.query('select text from answer where capture_id = $1 order by created_at', [
      things.capture,
    ]);
    expect(rows.map((row) => row.text)).toContain('Looks like the reluctor.');
    expect(rows).toHaveLength(2);
  });

  it('over 1 MiB are refused before they are read', async () => {
    const headers = { ...here.owner.browser, ...typed };
    const body = `name=${'x'.repeat(1024 * 1024 + 10)}`;
    expect((await send('POST', '/workshop?_action=patchWorkshop', { headers, body })).status).toBe(413);
  });
});
