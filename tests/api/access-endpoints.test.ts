import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Endpoint } from '../../src/contract/endpoint.ts';
import { ENDPOINTS, type EndpointId } from '../../src/contract/endpoints.ts';
import { ACCESS, type Grant, type Role } from '../../src/contract/roles.ts';
import {
  bearer,
  exerciseContent,
  forgetRates,
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
  send,
  sha256,
  storeSamples,
  type Things,
  type Workshop,
} from './security-kit.ts';

/** Every endpoint against every kind of caller, over HTTP, on the running product. */
const rows = Object.entries<Endpoint>(ENDPOINTS) as [EndpointId, Endpoint][];

const CALLERS = [
  'owner',
  'instructor',
  'technician',
  'learner',
  'owner of another workshop',
  'token to read',
  'token to read and write',
  'link to look',
  'link to answer',
  'nobody',
] as const;
type CallerName = (typeof CALLERS)[number];

let here: Workshop;
let elsewhere: Workshop;
let readToken: string;
let writeToken: string;

beforeAll(async () => {
  await forgetRates();
  [here, elsewhere] = await Promise.all([makeWorkshop(), makeWorkshop('Elsewhere')]);
  readToken = await makeToken(here.owner, here.id, ['read']);
  writeToken = await makeToken(here.owner, here.id, ['read', 'write']);
});
afterAll(() => pool.end());

const headersOf = (caller: CallerName): Readonly<Record<string, string>> => {
  if (caller === 'owner of another workshop') return elsewhere.owner.browser;
  if (caller === 'token to read') return bearer(readToken);
  if (caller === 'token to read and write') return bearer(writeToken);
  // A link's secret is in the path only; a cookie beside it is not looked at.
  if (caller === 'link to look' || caller === 'link to answer' || caller === 'nobody') return { origin };
  return here[caller].browser;
};

/** What is sent where something must be sent for the request to be a whole one. */
const BODIES: Partial<Record<EndpointId, (things: Things) => unknown>> = {
  'session.signUp': () => ({
    name: 'N',
    email: `${newId()}@people.example`,
    password: 'long enough',
    workshop: 'W',
  }),
  'session.confirmSignUp': () => ({ secret: newSecret() }),
  'session.signIn': () => ({ email: `${newId()}@people.example`, password: 'whatever' }),
  'session.code': () => ({ code: '123456' }),
  'session.askReset': () => ({ email: `${newId()}@people.example` }),
  'session.reset': () => ({ secret: newSecret(), password: 'long enough' }),
  'session.confirmEmail': () => ({ secret: newSecret() }),
  'invitations.create': () => ({ email: `${newId()}@people.example`, role: 'learner' }),
  'invitations.accept': () => ({ secret: newSecret() }),
  'me.patch': () => ({ mutedMail: [] }),
  // Passwords that are not theirs: what these do is tested elsewhere.
  'me.password': () => ({ current: 'guessed', password: 'long enough' }),
  'me.email': () => ({ email: `${newId()}@people.example`, password: 'guessed' }),
  'me.erase': () => ({ password: 'guessed' }),
  'secondStep.begin': () => ({ password: 'guessed' }),
  'secondStep.confirm': () => ({ code: '123456' }),
  'secondStep.renewCodes': () => ({ password: 'guessed' }),
  'secondStep.end': () => ({ password: 'guessed' }),
  'workshop.end': () => ({ name: 'Test workshop', password: 'guessed' }),
  'webhooks.create': () => ({ url: 'http://127.0.0.1/inward' }),
  'me.workshop': () => ({ workshopId: here.id }),
  'workshop.patch': () => ({ name: 'Test workshop' }),
  'people.patch': () => ({ role: 'technician' }),
  'tokens.create': () => ({ name: 'n', scopes: ['read'] }),
  'captures.patch': () => ({ note: 'n' }),
  'marks.create': () => ({ kind: 'point', signal: 0, from: 0.1, to: null, value: null, text: 't' }),
  'marks.patch': () => ({ text: 'u' }),
  'shareLinks.create': () => ({ question: 'q' }),
  'shared.answer': () => ({ name: 'A', text: 'It looks fine.' }),
  'knownGoods.create': ({ capture }) => ({
    captureId: capture,
    signals: [0],
    engine: { make: 'Corvane', model: 'Talin' },
    condition: 'cranking',
    provenance: 'test',
  }),
  'knownGoods.patch': () => ({ note: 'n' }),
  'knownGoods.review': () => ({ decision: 'return' }),
  'captures.checkImport': () => ({ csv: 'file\na.csv\n', files: ['a.csv'] }),
  'sets.create': () => ({ title: 'S' }),
  'sets.patch': () => ({ title: 'T' }),
  'sets.addItem': () => ({ kind: 'text', text: 'Look at the gap first.' }),
  'sets.putItems': ({ exercise }) => ({ items: [{ kind: 'exercise', exerciseId: exercise }] }),
  'exercises.create': ({ capture }) => ({ title: 'E', content: exerciseContent(capture) }),
  'exercises.patch': () => ({ title: 'F' }),
  'attempts.create': () => ({ cause: 'wide-gap' }),
  'attempts.judge': () => ({ mark: 'right' }),
  'jobs.create': () => ({ complaint: 'Cranks, does not start' }),
  'jobs.patch': () => ({ complaint: 'Cranks slowly' }),
  'jobChecks.put': () => ({ result: 'unclear' }),
  'jobCauses.put': () => ({ decision: 'set aside', why: 'has none' }),
  'jobEntries.create': () => ({ kind: 'note', text: 'n' }),
  'jobEntries.patch': () => ({ text: 'n' }),
  'captures.nearest': () => ({ signal: 0 }),
  'comparisons.patch': () => ({ sprocketTeeth: 20 }),
  'photos.patch': () => ({ caption: 'c' }),
  'comparisons.create': ({ knownGood }) => ({ signal: 0, knownGoodId: knownGood }),
};

const QUERIES: Partial<Record<EndpointId, string>> = {
  'captures.window': '?from=0&to=1&columns=1000',
  'shared.window': '?from=0&to=1&columns=1000',
  'exercises.window': '?from=0&to=1&columns=1000',
  'knownGoods.window': '?from=0&to=1&columns=1000',
};

interface Extra {
  readonly person: string;
  readonly token: string;
}

function pathOf(id: EndpointId, row: Endpoint, things: Things, secret: string, extra: Extra): string {
  const thing =
    row.opens === undefined ? extra[id.startsWith('people.') ? 'person' : 'token'] : things[row.opens];
  const path = row.path
    .replace('{id}', thing)
    .replace('{secret}', secret)
    .replace('{check}', 'spark')
    .replace('{cause}', 'coil');
  return `/api/v1${path}${QUERIES[id] ?? ''}`;
}

const TUS = {
  'tus-resumable': '1.0.0',
  'upload-length': '10',
  'content-type': 'application/offset+octet-stream',
};

async function call(id: EndpointId, row: Endpoint, caller: CallerName, things: Things) {
  const secret =
    caller === 'link to answer'
      ? things.answerSecret
      : caller === 'link to look'
        ? things.lookSecret
        : newSecret();
  const extra = { person: id.startsWith('people.') ? await spare() : '', token: newId() };
  const headers = { ...headersOf(caller), ...(row.bodyKind === 'tus' ? TUS : {}) };
  const body = row.bodyKind === undefined && row.body !== undefined ? BODIES[id]?.(things) : undefined;
  if (row.bodyKind === undefined && row.body !== undefined && body === undefined)
    throw new Error(`${id} takes a body: say which in BODIES`);
  return send(row.method, pathOf(id, row, things, secret, extra), { headers, body });
}

/** Somebody whose role may be changed. */
async function spare(): Promise<string> {
  const person = await makePerson('Spare');
  await join(person, here.id, 'learner');
  return person.id;
}

type Expected = 'goes on' | 401 | 403 | 404;

/** What the table says of a capture that the technician made, in words of status. */
function expectedFor(row: Endpoint, caller: CallerName): Expected {
  const access = ACCESS[row.access];
  if (access.nobody) return 'goes on';
  if (access.share !== 'no') {
    // Only the link's secret counts: everybody else has sent one that is not known.
    if (caller === 'link to answer') return 'goes on';
    if (caller === 'link to look') return access.share === 'look' ? 'goes on' : 403;
    return 404;
  }
  switch (caller) {
    case 'link to look':
    case 'link to answer':
    case 'nobody':
      return 401;
    case 'token to read':
      return access.scope === 'read' ? 'goes on' : 403;
    case 'token to read and write':
      return access.scope === 'read' || access.scope === 'write' ? 'goes on' : 403;
    case 'owner of another workshop':
      return row.opens === undefined ? 'goes on' : 404;
    default:
      return forRole(access[caller], row, caller);
  }
}

function forRole(grant: Grant, row: Endpoint, role: Role): Expected {
  if (row.opens === undefined) return grant === 'no' ? 403 : 'goes on';
  // What is set for everybody is there for a learner and a technician, an attempt of another person is not.
  if (row.opens === 'set' || row.opens === 'exercise') return grant === 'no' ? 403 : 'goes on';
  if (row.opens === 'attempt') return grant === 'no' ? 404 : 'goes on';
  // A learner does not see what the technician made, whatever they want with it; a workshop's known-goods do exist for them.
  const staffOnly: readonly (string | undefined)[] = ['knownGood', 'invitation', 'webhook'];
  if (role === 'learner') return staffOnly.includes(row.opens) ? 403 : 404;
  return grant === 'no' ? 403 : 'goes on';
}

/** These answer 404 for reasons that are not access: the thing named does not exist, for anybody. */
const NAMES_NOTHING: readonly EndpointId[] = [
  'tokens.delete',
  'sessions.delete',
  'uploads.head',
  'uploads.patch',
  'uploads.delete',
];

/** These read samples or the original from the store. */
const NEEDS_SAMPLES: readonly EndpointId[] = [
  'captures.window',
  'captures.original',
  'captures.export',
  'captures.picture',
  'shared.window',
  'exercises.window',
  'photos.image',
  'knownGoods.create',
];

/** What only reads, or is refused, shares its things with the other callers of the endpoint. */
const shared = new Map<EndpointId, Promise<Things>>();
function thingsFor(id: EndpointId): Promise<Things> {
  const made = shared.get(id) ?? makeThings(here.id, here.technician);
  shared.set(id, made);
  return made;
}

describe.each(rows)('%s', (id, row) => {
  it.concurrent.each(CALLERS)('called by %s', async (caller) => {
    const expected = expectedFor(row, caller);
    const changes = row.method !== 'GET' && expected === 'goes on';
    const things = changes ? await makeThings(here.id, here.technician) : await thingsFor(id);
    if (NEEDS_SAMPLES.includes(id))
      await Promise.all([storeSamples(things.capture, things.photo), storeSamples(things.exerciseCapture)]);
    const answer = await call(id, row, caller, things);
    // These end a session that other rows need.
    if (['session.signOut', 'session.signUp', 'sessions.deleteOthers', 'me.leave'].includes(id))
      await revive();
    if (expected !== 'goes on') {
      expect(answer.status).toBe(expected);
      if (row.method !== 'HEAD') expect(answer.json.error.code).toMatch(/^[a-z_]+$/);
      return;
    }
    const refusals = id === 'session.signIn' ? [403, 404, 421] : [401, 403, 404, 421];
    const allowed =
      NAMES_NOTHING.includes(id) || (caller === 'owner of another workshop' && row.path.includes('{id}'));
    if (allowed && answer.status === 404) return;
    // A caller from elsewhere asks to switch to a workshop that does not exist for them.
    if (id === 'me.workshop' && caller === 'owner of another workshop')
      return expect(answer.status).toBe(404);
    // And what they propose names a capture that does not exist for them.
    if ((id === 'knownGoods.create' || id === 'exercises.create') && caller === 'owner of another workshop')
      return expect(answer.status).toBe(404);
    expect(refusals).not.toContain(answer.status);
    expect(answer.status, answer.text).toBeLessThan(500);
  });
});

async function revive() {
  const people: Person[] = [here.owner, here.instructor, here.technician, here.learner, elsewhere.owner];
  const roles: Role[] = ['owner', 'instructor', 'technician', 'learner', 'owner'];
  for (const [at, person] of people.entries()) {
    await pool.query(
      'insert into membership (person_id, workshop_id, role) values ($1, $2, $3) on conflict do nothing',
      [person.id, person === elsewhere.owner ? elsewhere.id : here.id, roles[at]],
    );
    await pool.query(
      "insert into session (id, user_id, expires_at) values ($1, $2, now() + interval '20 days') on conflict do nothing",
      [sha256(person.sessionSecret), person.id],
    );
  }
}
