import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Endpoint } from '../../src/contract/endpoint.ts';
import { ENDPOINTS } from '../../src/contract/endpoints.ts';
import { PAGES } from '../../src/contract/pages.ts';
import {
  exerciseContent,
  join,
  makePerson,
  makeThings,
  makeWorkshop,
  newSecret,
  type Person,
  pool,
  send,
  sha256,
  storeSamples,
  type Things,
  type Workshop,
} from './security-kit.ts';

/**
 * Before committing, no route gives an exercise's answer away. Everything that is known of its trace carries one word that
 * occurs nowhere else; then a learner walks every endpoint and every page of the contract, with the id of everything that
 * was ever made from the trace, and looks for the word, the ids and the file's sum.
 */
const WORD = /zanzibar/i;

let here: Workshop;
let things: Things;
/** The same file uploaded once more. */
let twin: string;
let set: string;
let exercise: string;
const sum = sha256(newSecret());

beforeAll(async () => {
  here = await makeWorkshop();
  things = await makeThings(here.id, here.technician);
  await storeSamples(things.capture);
  const edits = [
    "update capture set title = 'Zanzibar tooth', note = 'zanzibar', file_name = 'zanzibar.csv', sha256 = $2 where id = $1",
    "update capture_signal set name = 'Zanzibar ' || index where capture_id = $1 and $2 <> ''",
    "update mark set text = 'zanzibar here' where capture_id = $1 and $2 <> ''",
    "update answer set text = 'zanzibar, surely' where capture_id = $1 and $2 <> ''",
    "update share_link set question = 'zanzibar?' where capture_id = $1 and $2 <> ''",
    "update known_good set model = 'Zanzibar', note = 'zanzibar', provenance = 'zanzibar', state = 'published' where capture_id = $1 and $2 <> ''",
  ];
  for (const edit of edits) await pool.query(edit, [things.capture, sum]);
  twin = (await makeThings(here.id, here.technician)).capture;
  await pool.query("update capture set title = 'Zanzibar again', sha256 = $2 where id = $1", [twin, sum]);
  // Only what this test makes is set for anybody.
  await pool.query("update teaching_set set state = 'draft' where workshop_id = $1", [here.id]);
  await pool.query(
    `insert into measurement (capture_id, revision, samples_version, engine, signals, relations)
     values ($1, 1, 1, '1', '[]', '[]')`,
    [things.capture],
  );

  const headers = here.instructor.browser;
  const content = exerciseContent(things.capture);
  const made = await send('POST', '/api/v1/exercises', {
    headers,
    body: {
      title: 'What is wrong?',
      state: 'open',
      content: { ...content, asks: { ...content.asks, stretch: { atMostS: null } } },
    },
  });
  expect(made.status, made.text).toBe(201);
  exercise = made.json.id;
  const group = await send('POST', '/api/v1/sets', {
    headers,
    body: { title: 'First steps', state: 'open', audience: 'everyone' },
  });
  set = group.json.id;
  const items = [
    { kind: 'exercise', exerciseId: exercise },
    { kind: 'text', text: 'It was the zanzibar tooth, as you saw.', afterCommit: true },
    { kind: 'capture', captureId: things.capture, text: 'The zanzibar capture.' },
    { kind: 'capture', captureId: twin, text: 'And zanzibar again.' },
  ];
  const put = await send('PUT', `/api/v1/sets/${set}/items`, { headers, body: { items } });
  expect(put.status, put.text).toBe(200);
});
afterAll(() => pool.end());

/** Ids of all that was made from the trace. */
const ofTheTrace = () => [
  things.capture,
  twin,
  things.mark,
  things.shareLink,
  things.answer,
  things.knownGood,
  things.comparison,
];

/** What a request may not bring to light, besides the word. */
const secrets = () => [...ofTheTrace(), sum];

function expectNothing(answer: Awaited<ReturnType<typeof send>>, at: string): void {
  const all = `${answer.text} ${JSON.stringify(answer.headers)}`;
  expect(WORD.test(all), `${at} says the word`).toBe(false);
  for (const secret of secrets()) expect(all.includes(secret), `${at} names ${secret}`).toBe(false);
}

const rows = Object.entries<Endpoint>(ENDPOINTS)
  // Signing out would end the walk; signing in and up ask for nothing of the workshop and are limited in number.
  .filter(([id]) => !id.startsWith('session.'));

/** A body with every field by which a thing can be named. */
const bodyFor = (row: Endpoint) =>
  row.body === undefined || row.bodyKind !== undefined
    ? undefined
    : {
        captureId: things.capture,
        captureIds: [things.capture],
        knownGoodId: things.knownGood,
        exerciseId: exercise,
        signal: 0,
        signals: [0],
        limit: 100,
        search: 'zanzibar',
      };

const queryFor = (row: Endpoint) =>
  row.method === 'GET' ? '?from=0&to=1&columns=100&limit=100&search=zanzibar&width=400&format=svg' : '';

describe('a learner who has not committed', () => {
  it.each(rows)('%s brings nothing of the trace to light', async (id, row) => {
    const learner = await learnerOf();
    const ids = row.path.includes('{') ? [...ofTheTrace(), exercise, set] : [''];
    for (const thing of ids) {
      // Committing opens the answer: that is what the next tests are about.
      if (id === 'attempts.create' && thing === exercise) continue;
      const path = row.path.replace(/\{(\w+)\}/g, (_, name: string) =>
        name === 'secret' ? newSecret() : thing,
      );
      for (const query of row.method === 'GET' ? [queryFor(row), ''] : ['']) {
        const answer = await send(row.method, `/api/v1${path}${query}`, {
          headers: learner.browser,
          body: bodyFor(row),
        });
        expectNothing(answer, `${row.method} ${path}${query}`);
        expect(answer.status, `${row.method} ${path}`).toBeLessThan(500);
        // A window is asked for by its query; without one it is refused before anybody looks at what it is of.
        const asked = row.query === undefined || query !== '' || !path.includes('window');
        if (row.opens !== undefined && ofTheTrace().includes(thing) && asked)
          expect(answer.status, `${row.method} ${path}`).toBe(404);
      }
    }
  });

  it.each(Object.keys(PAGES))('page %s brings nothing of the trace to light', async (page) => {
    const learner = await learnerOf();
    const ids = page.includes('{') ? [...ofTheTrace(), exercise, set] : [''];
    for (const thing of ids) {
      const path = page.replace(/\{(\w+)\}/g, (_, name: string) => (name === 'secret' ? newSecret() : thing));
      for (const query of ['', `?search=zanzibar&capture=${'x'}&engine=Zanzibar&condition=cranking`]) {
        const answer = await send('GET', path + query, { headers: learner.browser });
        // A page may repeat what was searched for or asked for in its address, not more.
        const text = answer.text.replaceAll('zanzibar', '').replaceAll(thing || '\0', '');
        const said = query === '' ? answer.text.replaceAll(thing || '\0', '') : text;
        expect(WORD.test(said.replaceAll('engine=Zanzibar', '')), `${path}${query}`).toBe(false);
        for (const secret of secrets()) expect(said.includes(secret), `${path} names ${secret}`).toBe(false);
        if (ofTheTrace().includes(thing)) expect(answer.status, path).toBeGreaterThanOrEqual(400);
      }
    }
  });

  it('gets the samples under neutral names and own numbers only', async () => {
    const learner = await learnerOf();
    const { json, text } = await send('GET', `/api/v1/exercises/${exercise}`, { headers: learner.browser });
    expect(json.trace.signals).toEqual([
      { index: 0, name: 'Signal 1', circuit: 'other', unit: '', factor: 1, offset: 0 },
    ]);
    expect(json).toMatchObject({ answer: null, attempt: null, staff: null });
    expect(text).not.toMatch(WORD);
    const window = (query: string) =>
      send('GET', `/api/v1/exercises/${exercise}/window?from=0&to=1&columns=100${query}`, {
        headers: learner.browser,
      });
    const samples = await window(`&v=${json.trace.samplesVersion}`);
    expect(samples.status).toBe(200);
    expect(samples.headers['gapmark-signals']).toBe('0');
    expect(samples.headers['cache-control']).toContain('immutable');
    // The capture has a second signal, which the exercise does not show.
    expect((await window('&signals=1')).status).toBe(422);
    expect((await window(`&v=${json.trace.samplesVersion + 1}`)).status).toBe(409);
  });

  it('is told in the set that something opens later, and not what', async () => {
    const learner = await learnerOf();
    const { json } = await send('GET', `/api/v1/sets/${set}`, { headers: learner.browser });
    expect(json.items.map((item: { withheld: boolean }) => item.withheld)).toEqual([false, true, true, true]);
    expect(json.items.slice(1).every((item: { text: string }) => item.text === '')).toBe(true);
  });

  it('has nothing of it when an exercise has another learner’s name on it', async () => {
    const stranger = await learnerOf();
    const { status } = await send('PATCH', `/api/v1/sets/${set}`, {
      headers: here.instructor.browser,
      body: { audience: 'named', people: [here.learner.id] },
    });
    expect(status).toBe(200);
    for (const path of [
      `/exercises/${exercise}`,
      `/sets/${set}`,
      `/exercises/${exercise}/window?from=0&to=1&columns=9`,
    ])
      expect((await send('GET', `/api/v1${path}`, { headers: stranger.browser })).status, path).toBe(404);
    const list = await send('GET', '/api/v1/exercises', { headers: stranger.browser });
    expect(list.json.items).toEqual([]);
    await send('PATCH', `/api/v1/sets/${set}`, {
      headers: here.instructor.browser,
      body: { audience: 'everyone' },
    });
  });
});

describe('a learner who has committed', () => {
  it('sees answer, names, numbers, capture and what followed; others still do not', async () => {
    const [learner, other] = [await learnerOf(), await learnerOf()];
    const get = (path: string, person = learner) =>
      send('GET', `/api/v1${path}`, { headers: person.browser });
    const made = await send('POST', `/api/v1/exercises/${exercise}/attempts`, {
      headers: learner.browser,
      body: { cause: 'wide-gap', stretch: { from: 0.39, to: 0.46 } },
    });
    expect(made.status, made.text).toBe(201);
    expect(made.json.answer.sentence).toMatch(WORD);
    expect(made.json.answer.signals[0].name).toBe('Zanzibar 0');
    expect(made.json.answer.captureId).toBe(things.capture);
    expect(made.json.attempt).toMatchObject({
      outcome: 'partly',
      marks: { stretch: { mark: 'right' }, cause: { mark: 'wrong' } },
    });

    expect((await get(`/captures/${things.capture}`)).json.title).toBe('Zanzibar tooth');
    for (const part of ['measurements', 'marks', 'window?from=0&to=1&columns=9', 'original', 'export'])
      expect((await get(`/captures/${things.capture}/${part}`)).status, part).toBe(200);
    expect((await get('/captures?limit=100')).json.items.map(({ id }: { id: string }) => id)).toContain(
      things.capture,
    );
    expect((await get(`/sets/${set}`)).text).toMatch(/zanzibar tooth, as you saw/);
    // Seeing is all: it is not theirs to change, and the library stays with those who keep it.
    const patch = await send('PATCH', `/api/v1/captures/${things.capture}`, {
      headers: learner.browser,
      body: { note: 'x' },
    });
    expect(patch.status).toBe(403);
    expect((await get(`/known-goods/${things.knownGood}`)).status).toBe(403);

    expect((await get(`/captures/${things.capture}`, other)).status).toBe(404);
    expect((await get(`/exercises/${exercise}`, other)).text).not.toMatch(WORD);
  });

  it('keeps their own upload of the same file', async () => {
    const learner = await learnerOf();
    const own = await makeThings(here.id, learner, { practice: true });
    await pool.query('update capture set sha256 = $2 where id = $1', [own.capture, sum]);
    const status = async () =>
      (await send('GET', `/api/v1/captures/${own.capture}`, { headers: learner.browser })).status;
    expect(await status()).toBe(200);
  });
});

async function learnerOf(): Promise<Person> {
  const learner = await makePerson('Test learner');
  await join(learner, here.id, 'learner');
  return learner;
}
