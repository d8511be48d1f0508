import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  exerciseContent,
  join,
  makePerson,
  makeThings,
  makeWorkshop,
  newId,
  type Person,
  pool,
  send,
  storeSamples,
  type Workshop,
} from './security-kit.ts';

let here: Workshop;
let captureId: string;

beforeAll(async () => {
  here = await makeWorkshop();
});
beforeEach(async () => {
  captureId = (await makeThings(here.id, here.technician)).capture;
  await storeSamples(captureId);
});
afterAll(() => pool.end());

type Json = Awaited<ReturnType<typeof send>>['json'];
const call = (
  person: Person,
  method: string,
  path: string,
  body?: unknown,
  headers: Record<string, string> = {},
) => send(method, `/api/v1${path}`, { headers: { ...person.browser, ...headers }, body });

async function made(path: string, body: unknown): Promise<Json> {
  const answer = await call(here.instructor, 'POST', path, body);
  expect(answer.status, answer.text).toBe(201);
  return answer.json;
}

async function learner(name = 'Test learner'): Promise<Person> {
  const person = await makePerson(name);
  await join(person, here.id, 'learner');
  return person;
}

type Asks = Record<string, unknown>;
const content = (asks: Asks = {}) => {
  const base = exerciseContent(captureId);
  return { ...base, asks: { ...base.asks, ...asks } };
};

/** An open exercise in an open set for everybody. */
async function openExercise(
  asks: Asks = {},
  title = 'What is wrong?',
): Promise<{ exercise: string; set: string }> {
  const { id: exercise } = await made('/exercises', { title, state: 'open', content: content(asks) });
  const { id: set } = await made('/sets', { title: 'First steps', state: 'open', audience: 'everyone' });
  await made(`/sets/${set}/items`, { kind: 'exercise', exerciseId: exercise });
  return { exercise, set };
}

const noCause = { cause: null };

describe('a set', () => {
  it('holds texts, captures and exercises in the order given, and takes a new order in one go', async () => {
    const { id: exerciseId } = await made('/exercises', { title: 'E', content: content() });
    const { id } = await made('/sets', { title: 'Order' });
    const first = await call(here.instructor, 'PUT', `/sets/${id}/items`, {
      items: [
        { kind: 'text', text: 'Look at the gap first.' },
        { kind: 'capture', captureId, text: 'A sound pair.' },
        { kind: 'exercise', exerciseId },
      ],
    });
    expect(first.status, first.text).toBe(200);
    const [text, capture, exercise] = first.json.items;
    const turned = await call(
      here.instructor,
      'PUT',
      `/sets/${id}/items`,
      {
        items: [
          { id: exercise.id, kind: 'exercise', exerciseId },
          { id: text.id, kind: 'text', text: 'Look at the gap.' },
        ],
      },
      { 'if-match': first.headers.etag ?? '' },
    );
    expect(turned.json.items.map((item: Json) => item.id)).toEqual([exercise.id, text.id]);
    expect(turned.json.items[1].text).toBe('Look at the gap.');
    const list = await call(here.instructor, 'GET', `/sets/${id}/items`);
    expect(list.json.items).toHaveLength(2);
    expect(list.text).not.toContain(capture.id);
  });

  it('is not overwritten by who opened it before somebody changed it: 412', async () => {
    const { id } = await made('/sets', { title: 'Two writers' });
    const { headers } = await call(here.instructor, 'GET', `/sets/${id}`);
    const match = { 'if-match': headers.etag ?? '' };
    expect((await call(here.owner, 'PATCH', `/sets/${id}`, { title: 'Mine' }, match)).status).toBe(200);
    for (const [method, path, body] of [
      ['PATCH', `/sets/${id}`, { title: 'Yours' }],
      ['PUT', `/sets/${id}/items`, { items: [] }],
      ['DELETE', `/sets/${id}`, undefined],
    ] as const)
      expect((await call(here.instructor, method, path, body, match)).status, method).toBe(412);
    expect((await call(here.instructor, 'GET', `/sets/${id}`)).json.title).toBe('Mine');
  });

  it('comes back within 30 days with its items, and not after', async () => {
    const { set, exercise } = await openExercise();
    const person = await learner();
    expect((await call(here.instructor, 'DELETE', `/sets/${set}`)).status).toBe(204);
    expect((await call(person, 'GET', `/sets/${set}`)).status).toBe(404);
    expect((await call(person, 'GET', `/exercises/${exercise}`)).status).toBe(404);
    const back = await call(here.instructor, 'POST', `/sets/${set}/restore`);
    expect(back.json.items).toHaveLength(1);
    expect((await call(person, 'GET', `/exercises/${exercise}`)).status).toBe(200);
    await pool.query("update teaching_set set deleted_at = now() - interval '31 days' where id = $1", [set]);
    expect((await call(here.instructor, 'POST', `/sets/${set}/restore`)).status).toBe(404);
  });

  it('is seen by those it is set for, from the next request on', async () => {
    const [ada, ben] = [await learner('Ada'), await learner('Ben')];
    const { id } = await made('/sets', {
      title: 'Named',
      state: 'open',
      audience: 'named',
      people: [ada.id],
    });
    const seen = async (person: Person) => (await call(person, 'GET', `/sets/${id}`)).status;
    expect([await seen(ada), await seen(ben), await seen(here.technician)]).toEqual([200, 404, 404]);
    const listed = await call(ben, 'GET', '/sets?limit=100');
    expect(listed.text).not.toContain(id);
    await call(here.instructor, 'PATCH', `/sets/${id}`, { people: [ben.id] });
    expect([await seen(ada), await seen(ben)]).toEqual([404, 200]);
    await call(here.instructor, 'PATCH', `/sets/${id}`, { state: 'draft' });
    expect([await seen(ben), await seen(here.owner)]).toEqual([404, 200]);
    const stranger = await makePerson('Elsewhere');
    const refused = await call(here.instructor, 'PATCH', `/sets/${id}`, { people: [stranger.id] });
    expect(refused.status).toBe(422);
  });

  it('takes no thing of another workshop', async () => {
    const other = await makeWorkshop('Other');
    const theirs = await makeThings(other.id, other.owner);
    const { id } = await made('/sets', { title: 'Own things' });
    for (const item of [
      { kind: 'capture', captureId: theirs.capture },
      { kind: 'exercise', exerciseId: theirs.exercise },
    ])
      expect((await call(here.instructor, 'POST', `/sets/${id}/items`, item)).status, item.kind).toBe(422);
    const answer = await call(here.instructor, 'POST', '/exercises', {
      title: 'E',
      content: exerciseContent(theirs.capture),
    });
    expect(answer.status).toBe(404);
  });
});

describe('committing', () => {
  it('of two answers at the same moment takes one; the other is 409', async () => {
    const { exercise } = await openExercise();
    const person = await learner();
    const answers = await Promise.all(
      ['bent-tooth', 'wide-gap', 'bent-tooth', 'wide-gap'].map((cause) =>
        call(person, 'POST', `/exercises/${exercise}/attempts`, { cause }),
      ),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409, 409, 409]);
    const { rows } = await pool.query('select answers from attempt where exercise_id = $1', [exercise]);
    expect(rows).toHaveLength(1);
    const won = answers.find(({ status }) => status === 201);
    expect(rows[0].answers.cause).toBe(won?.json.attempt.answers.cause);
  });

  it('answers the same again for the same Idempotency-Key', async () => {
    const { exercise } = await openExercise();
    const person = await learner();
    const key = { 'idempotency-key': newId() };
    const once = await call(person, 'POST', `/exercises/${exercise}/attempts`, { cause: 'bent-tooth' }, key);
    const again = await call(person, 'POST', `/exercises/${exercise}/attempts`, { cause: 'bent-tooth' }, key);
    expect([once.status, again.status]).toEqual([201, 201]);
    expect(again.text).toBe(once.text);
  });

  it('counts nothing as tried while a part is missing, unreadable or not asked for', async () => {
    const value = { label: 'Supply', answer: 12.5, unit: 'V', tolerance: 0.2 };
    const { exercise } = await openExercise({ value });
    const person = await learner();
    const tried = (body: unknown) => call(person, 'POST', `/exercises/${exercise}/attempts`, body);
    const missing = await tried({ cause: 'bent-tooth' });
    expect(missing.json.error.details).toEqual([{ path: 'value', message: 'type the value' }]);
    for (const text of ['about twelve', '1.234,5', '12.5 ms'])
      expect((await tried({ cause: 'bent-tooth', value: { text, unit: 'V' } })).status, text).toBe(422);
    expect((await tried({ cause: 'bent-tooth', value: { text: '12' }, text: 'x' })).status).toBe(422);
    expect((await tried({ cause: 'worn-out', value: { text: '12 V' } })).status).toBe(422);
    expect((await call(person, 'GET', `/exercises/${exercise}`)).json.attempt).toBeNull();
    const done = await tried({ cause: 'bent-tooth', value: { text: '12,6', unit: 'V' } });
    expect(done.json.attempt).toMatchObject({
      outcome: 'right',
      answers: { value: { number: 12.6, unit: 'V' } },
    });
  });

  it.each([
    ['12.6', 'V', 'right'],
    ['12,6', 'V', 'right'],
    ['12600', 'mV', 'right'],
    ['0,0126 kV', 'V', 'right'],
    ['12,8', 'V', 'wrong'],
  ])('marks %s with %s as %s', async (text, unit, mark) => {
    const value = { label: 'Supply', answer: 12.5, unit: 'V', tolerance: 0.2 };
    const { exercise } = await openExercise({ ...noCause, value });
    const answer = await call(await learner(), 'POST', `/exercises/${exercise}/attempts`, {
      value: { text, unit },
    });
    expect(answer.json.attempt.marks.value.mark).toBe(mark);
  });

  it('names the circuit and points at the place', async () => {
    const asks = {
      ...noCause,
      stretch: { atMostS: null },
      circuit: { signal: 0, answer: 'crank-vr', choices: [] },
    };
    const { exercise } = await openExercise(asks);
    const commit = async (circuit: string, from: number, to: number) =>
      (
        await call(await learner(), 'POST', `/exercises/${exercise}/attempts`, {
          circuit,
          stretch: { from, to },
        })
      ).json.attempt.outcome;
    expect(await commit('crank-vr', 0.39, 0.46)).toBe('right');
    expect(await commit('cam-vr', 0.39, 0.46)).toBe('partly');
    expect(await commit('cam-vr', 0.7, 0.75)).toBe('wrong');
  });

  it('is refused for a draft, a retracted exercise and a version that is no longer there', async () => {
    const { exercise } = await openExercise();
    const person = await learner();
    const patch = (body: unknown) => call(here.instructor, 'PATCH', `/exercises/${exercise}`, body);
    const commit = (who: Person, version?: number) =>
      call(who, 'POST', `/exercises/${exercise}/attempts`, { cause: 'bent-tooth', version });
    await patch({ state: 'retracted' });
    expect((await commit(person)).status).toBe(404);
    expect((await commit(here.instructor)).status).toBe(409);
    await patch({ state: 'open', content: { ...content(), question: 'Look again: which cause?' } });
    const stale = await commit(person, 1);
    expect(stale.status).toBe(409);
    expect(stale.json.error.message).toMatch(/changed since you opened it/);
    expect((await commit(person, 2)).status).toBe(201);
  });
});

describe('changing an exercise after it was answered', () => {
  it('leaves every attempt with the version that it answered', async () => {
    const { exercise } = await openExercise();
    const [early, late] = [await learner('Early'), await learner('Late')];
    await call(early, 'POST', `/exercises/${exercise}/attempts`, { cause: 'bent-tooth' });
    const changed = content();
    changed.asks.cause.answer = 'wide-gap';
    changed.answer.sentence = 'It was the gap after all.';
    const patched = await call(here.instructor, 'PATCH', `/exercises/${exercise}`, { content: changed });
    expect(patched.json.staff.content.answer.sentence).toBe('It was the gap after all.');
    await call(late, 'POST', `/exercises/${exercise}/attempts`, { cause: 'bent-tooth' });
    const seen = async (person: Person) => (await call(person, 'GET', `/exercises/${exercise}`)).json;
    expect(await seen(early)).toMatchObject({
      version: 1,
      attempt: { outcome: 'right', version: 1 },
      answer: { cause: { key: 'bent-tooth' } },
    });
    expect(await seen(late)).toMatchObject({
      version: 2,
      attempt: { outcome: 'wrong', version: 2 },
      answer: { cause: { key: 'wide-gap' } },
    });
    // Retracted, it stays readable for those who answered it, and is gone for others.
    await call(here.instructor, 'PATCH', `/exercises/${exercise}`, { state: 'retracted' });
    expect((await seen(early)).attempt.outcome).toBe('right');
    expect((await call(await learner(), 'GET', `/exercises/${exercise}`)).status).toBe(404);
  });

  it('makes no version of a change of title', async () => {
    const { exercise } = await openExercise();
    const { json } = await call(here.instructor, 'PATCH', `/exercises/${exercise}`, {
      title: 'Other words',
      content: content(),
    });
    expect(json).toMatchObject({ title: 'Other words', version: 1 });
  });

  it('keeps what was answered when the exercise is deleted and brought back, and when its capture goes', async () => {
    const { exercise } = await openExercise();
    const person = await learner();
    await call(person, 'POST', `/exercises/${exercise}/attempts`, { cause: 'bent-tooth' });
    await call(here.instructor, 'DELETE', `/exercises/${exercise}`);
    expect((await call(person, 'GET', `/exercises/${exercise}`)).status).toBe(404);
    await call(here.instructor, 'POST', `/exercises/${exercise}/restore`);
    await call(here.owner, 'DELETE', `/captures/${captureId}`);
    const { json } = await call(person, 'GET', `/exercises/${exercise}`);
    expect(json).toMatchObject({ trace: null, attempt: { outcome: 'right' }, answer: { captureId: null } });
    const window = await call(person, 'GET', `/exercises/${exercise}/window?from=0&to=1&columns=9`);
    expect(window.status).toBe(404);
  });
});

describe('free text', () => {
  it('waits for an instructor, who judges it with a word; of two judges the second is told', async () => {
    const { exercise } = await openExercise({ ...noCause, text: { prompt: 'What would you check next?' } });
    const person = await learner();
    const done = await call(person, 'POST', `/exercises/${exercise}/attempts`, {
      text: '=The wheel, through the sensor hole',
    });
    expect(done.json.attempt.outcome).toBe('waiting');
    const { json } = await call(here.instructor, 'GET', `/exercises/${exercise}/attempts`);
    const [attempt] = json.items;
    expect(attempt.person.id).toBe(person.id);
    expect((await call(person, 'PATCH', `/attempts/${attempt.id}`, { mark: 'right' })).status).toBe(403);
    const match = { 'if-match': attempt.etag };
    const judged = await call(
      here.instructor,
      'PATCH',
      `/attempts/${attempt.id}`,
      { mark: 'partly', comment: 'Key out first.' },
      match,
    );
    expect(judged.json).toMatchObject({
      outcome: 'partly',
      comment: 'Key out first.',
      judgedBy: here.instructor.name,
    });
    expect(
      (await call(here.owner, 'PATCH', `/attempts/${attempt.id}`, { mark: 'wrong' }, match)).status,
    ).toBe(412);
    expect((await call(person, 'GET', `/exercises/${exercise}`)).json.attempt.comment).toBe('Key out first.');
  });

  it('of an answer without text cannot be judged', async () => {
    const { exercise } = await openExercise();
    await call(await learner(), 'POST', `/exercises/${exercise}/attempts`, { cause: 'bent-tooth' });
    const { json } = await call(here.instructor, 'GET', `/exercises/${exercise}/attempts`);
    expect(
      (await call(here.instructor, 'PATCH', `/attempts/${json.items[0].id}`, { mark: 'right' })).status,
    ).toBe(409);
  });
});

describe('results', () => {
  it('count learner by exercise and which cause was taken for which; those who know the answer do not count', async () => {
    const { exercise, set } = await openExercise();
    const people = [await learner('Ada'), await learner('Ben'), await learner('Cleo')];
    const causes = ['wide-gap', 'wide-gap', 'bent-tooth'];
    for (const [at, person] of people.entries())
      await call(person, 'POST', `/exercises/${exercise}/attempts`, { cause: causes[at] });
    await call(here.instructor, 'POST', `/exercises/${exercise}/attempts`, { cause: 'bent-tooth' });
    const { json } = await call(here.instructor, 'GET', `/sets/${set}/results`);
    expect(json.exercises).toEqual([
      { id: exercise, title: 'What is wrong?', right: 1, tried: 3, waiting: 0 },
    ]);
    const ada = json.people.find(({ id }: Json) => id === people[0]?.id);
    expect(ada.attempts.map(({ outcome }: Json) => outcome)).toEqual(['wrong']);
    expect(json.confusion.causes.map(({ key }: Json) => key)).toEqual(['bent-tooth', 'wide-gap']);
    expect(json.confusion.counts).toEqual([
      [1, 2],
      [0, 0],
    ]);
    expect((await call(people[0]!, 'GET', `/sets/${set}/results`)).status).toBe(403);
    expect((await call(here.technician, 'GET', `/sets/${set}/results/export`)).status).toBe(403);
  });

  it('export as CSV whose text no spreadsheet takes for a formula', async () => {
    const value = { label: 'Level', answer: -2, unit: 'V', tolerance: 1 };
    const { exercise, set } = await openExercise({ ...noCause, value, text: { prompt: 'Why?' } }, '@What?');
    const person = await learner('=Ada');
    await call(person, 'POST', `/exercises/${exercise}/attempts`, {
      value: { text: '-2', unit: 'V' },
      text: '=HYPERLINK("x")',
      why: '+1',
      sure: 'guess',
    });
    const { text, headers } = await call(here.instructor, 'GET', `/sets/${set}/results/export`);
    expect(headers['content-type']).toBe('text/csv; charset=utf-8');
    expect(headers['content-disposition']).toContain('attachment');
    const line = text.split('\r\n').find((each) => each.includes('HYPERLINK')) ?? '';
    expect(line).toContain(`'=Ada,1,'@What?,1,waiting`);
    expect(line).toContain(`"'=HYPERLINK(""x"")"`);
    expect(line).toContain(`'+1`);
    // Numbers never get an apostrophe.
    expect(line).toContain(',-2,V,right,');
    expect(text).toContain('not tried');
  });
});

describe('an exercise', () => {
  it.each([
    ['asks for nothing', { cause: null }, 'content.asks'],
    [
      'has an answer that is not among the choices',
      { cause: { choices: exerciseContent('x').asks.cause.choices, answer: 'other' } },
      'content.asks.cause.answer',
    ],
    [
      'asks for a circuit of a signal that it does not show',
      { circuit: { signal: 3, answer: 'other', choices: [] } },
      'content.asks.circuit.signal',
    ],
  ])('that %s is refused, naming the field', async (_, asks, path) => {
    const answer = await call(here.instructor, 'POST', '/exercises', { title: 'E', content: content(asks) });
    expect(answer.status).toBe(422);
    expect(answer.json.error.details.map((detail: Json) => detail.path)).toContain(path);
  });

  it('names only signals and stretches that its capture has', async () => {
    for (const over of [{ signals: [7] }, { from: 50, to: 60 }]) {
      const answer = await call(here.instructor, 'POST', '/exercises', {
        title: 'E',
        content: { ...content(), ...over },
      });
      expect(answer.status, JSON.stringify(over)).toBe(422);
    }
  });

  it('shows its own stretch of the trace only', async () => {
    const { id } = await made('/exercises', { title: 'E', content: { ...content(), from: 0.2, to: 0.4 } });
    const { json } = await call(here.instructor, 'GET', `/exercises/${id}`);
    expect(json.trace).toMatchObject({ startS: 0.2, samples: 200 });
    const window = await call(here.instructor, 'GET', `/exercises/${id}/window?from=-5&to=5&columns=4096`);
    expect(Number(window.headers['gapmark-from'])).toBeCloseTo(0.2, 9);
    expect(Number(window.headers['gapmark-to'])).toBeCloseTo(0.4, 9);
    expect(Number(window.headers['gapmark-count'])).toBe(201);
  });

  it('leaves a line in the list of what happened when it opens, changes and goes', async () => {
    const { exercise } = await openExercise();
    await call(here.instructor, 'PATCH', `/exercises/${exercise}`, { state: 'retracted' });
    await call(here.instructor, 'DELETE', `/exercises/${exercise}`);
    const { json } = await call(here.owner, 'GET', '/audit?limit=100');
    const actions = json.items.map(({ action }: Json) => action);
    for (const action of ['exercise made (open)', 'exercise retracted', 'exercise deleted', 'set made'])
      expect(actions).toContain(action);
  });
});
