import { createHash, randomBytes } from 'node:crypto';
import { request as httpRequest, type IncomingHttpHeaders } from 'node:http';
import { PutObjectCommand, S3Client } from '@aws-sdk/client-s3';
import pg from 'pg';
import type { Role, Scope } from '../../src/contract/roles.ts';

/**
 * What the access, session and sharing tests stand on: people, sessions, tokens and things, written straight into the
 * database of the running product, so that a test of who may do what does not depend on how things come to be.
 */

const needed = (name: string): string => {
  const value = process.env[name];
  if (value === undefined || value === '')
    throw new Error(`${name} is not set: run these tests with npm test`);
  return value;
};

export const origin = needed('GAPMARK_TEST_ORIGIN');
export const pool = new pg.Pool({
  connectionString: needed('DATABASE_URL'),
  max: 4,
  // These rows need not outlive a power cut, and there are thousands.
  options: '-c synchronous_commit=off',
});

const ALPHABET = 'abcdefghijklmnopqrstuvwxyz234567';
export const newId = () => Array.from(randomBytes(20), (byte) => ALPHABET[byte & 31]).join('');
export const newSecret = () => randomBytes(32).toString('base64url');
export const sha256 = (text: string) => createHash('sha256').update(text).digest('hex');

export interface Answer {
  readonly status: number;
  readonly headers: IncomingHttpHeaders;
  readonly text: string;
  // biome-ignore lint/suspicious/noExplicitAny: an answer may be of any shape; each test says which it expects
  readonly json: any;
}

export interface Sent {
  readonly headers?: Readonly<Record<string, string>>;
  /** Sent as JSON, unless it is a string. */
  readonly body?: unknown;
  /** One of this machine's loopback addresses to come from, so that a file's tries are counted apart. */
  readonly from?: string;
}

/** One request with exactly these headers; nothing is added but Content-Type for JSON and Content-Length. */
export function send(method: string, path: string, { headers = {}, body, from }: Sent = {}): Promise<Answer> {
  const url = new URL(path, origin);
  const text = body === undefined || typeof body === 'string' ? body : JSON.stringify(body);
  const own: Record<string, string> = {};
  if (body !== undefined && typeof body !== 'string') own['content-type'] = 'application/json';
  if (text !== undefined) own['content-length'] = String(Buffer.byteLength(text));
  return new Promise((resolve, reject) => {
    const options = { method, headers: { ...own, ...headers }, agent: false as const, localAddress: from };
    const outgoing = httpRequest(url, { ...options, timeout: 30_000 }, (incoming) => {
      const chunks: Buffer[] = [];
      incoming.on('data', (chunk: Buffer) => chunks.push(chunk));
      incoming.on('error', reject);
      incoming.on('end', () => {
        const received = Buffer.concat(chunks).toString('utf8');
        const isJson = received !== '' && incoming.headers['content-type']?.startsWith('application/json');
        resolve({
          status: incoming.statusCode ?? 0,
          headers: incoming.headers,
          text: received,
          json: isJson ? JSON.parse(received) : undefined,
        });
      });
    });
    outgoing.on('timeout', () => outgoing.destroy(new Error(`${method} ${path} was not answered`)));
    outgoing.on('error', reject);
    outgoing.end(text);
  });
}

export interface Person {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  /** Headers of a browser that is signed in and shows one of our own pages. */
  readonly browser: Readonly<Record<string, string>>;
  /** The secret in the session's cookie. */
  readonly sessionSecret: string;
}

export const cookieHeaders = (secret: string) => ({ cookie: `gapmark=${secret}`, origin });
export const bearer = (token: string) => ({ authorization: `Bearer ${token}` });

export async function makePerson(name: string, passwordHash = 'none'): Promise<Person> {
  const id = newId();
  const email = `${name.toLowerCase().replace(/\W+/g, '.')}.${id}@people.example`;
  await pool.query('insert into person (id, email, name, password_hash) values ($1, $2, $3, $4)', [
    id,
    email,
    name,
    passwordHash,
  ]);
  const sessionSecret = newSecret();
  await pool.query(
    "insert into session (id, user_id, expires_at) values ($1, $2, now() + interval '20 days')",
    [sha256(sessionSecret), id],
  );
  return { id, name, email, sessionSecret, browser: cookieHeaders(sessionSecret) };
}

export async function join(person: Person, workshopId: string, role: Role): Promise<void> {
  await pool.query('insert into membership (person_id, workshop_id, role) values ($1, $2, $3)', [
    person.id,
    workshopId,
    role,
  ]);
  await pool.query(
    'update person set current_workshop_id = coalesce(current_workshop_id, $2) where id = $1',
    [person.id, workshopId],
  );
}

export async function makeToken(
  person: Person,
  workshopId: string,
  scopes: Scope[],
  days = 30,
): Promise<string> {
  const secret = `gapmark_${newSecret()}`;
  await pool.query(
    `insert into token (id, person_id, workshop_id, name, hash, scopes, expires_at)
     values ($1, $2, $3, 'test', $4, $5, now() + make_interval(days => $6))`,
    [newId(), person.id, workshopId, sha256(secret), scopes, days],
  );
  return secret;
}

export interface Workshop {
  readonly id: string;
  readonly owner: Person;
  readonly instructor: Person;
  readonly technician: Person;
  readonly learner: Person;
}

export async function makeWorkshop(name = 'Test workshop'): Promise<Workshop> {
  const id = newId();
  await pool.query('insert into workshop (id, name) values ($1, $2)', [id, name]);
  const made = async (role: Role) => {
    const person = await makePerson(`Test ${role}`);
    await join(person, id, role);
    return person;
  };
  return {
    id,
    owner: await made('owner'),
    instructor: await made('instructor'),
    technician: await made('technician'),
    learner: await made('learner'),
  };
}

export interface Things {
  readonly capture: string;
  readonly mark: string;
  readonly shareLink: string;
  /** Secret of a link that may look only. */
  readonly lookSecret: string;
  /** Secret of a link that may answer; `shareLink` is this one. */
  readonly answerSecret: string;
  readonly answer: string;
  readonly knownGood: string;
  readonly comparison: string;
  /** Open and set for everybody; it holds the exercise. */
  readonly set: string;
  readonly exercise: string;
  /** What the exercise rests on: a capture of its own. */
  readonly exerciseCapture: string;
  /** Somebody else's, with a text that waits to be judged. */
  readonly attempt: string;
  readonly invitation: string;
  readonly webhook: string;
  readonly job: string;
  readonly jobEntry: string;
  readonly photo: string;
}

/** A capture of two signals with a mark, two links, an answer, a known-good and a comparison, a set with an exercise, a job with a note. */
export async function makeThings(
  workshopId: string,
  maker: Person,
  { practice = false }: { practice?: boolean } = {},
): Promise<Things> {
  const things: Things = {
    capture: newId(),
    mark: newId(),
    shareLink: newId(),
    lookSecret: newSecret(),
    answerSecret: newSecret(),
    answer: newId(),
    knownGood: newId(),
    comparison: newId(),
    set: newId(),
    exercise: newId(),
    exerciseCapture: newId(),
    attempt: newId(),
    invitation: newId(),
    webhook: newId(),
    job: newId(),
    jobEntry: newId(),
    photo: newId(),
  };
  const axis = JSON.stringify({ kind: 'even', startS: 0, stepS: 0.001, count: 1000 });
  await pool.query(
    `insert into capture (id, workshop_id, created_by, title, practice, status, samples_version, axis, samples, sha256, bytes,
       file_name, original_key) values ($1, $2, $3, 'Crank and cam', $4, 'ready', 1, $5, 1000, 'ab', 10, 'private-name.csv', $6)`,
    [things.capture, workshopId, maker.id, practice, axis, `captures/${things.capture}/original`],
  );
  await pool.query(
    `insert into capture_signal (capture_id, index, "column", name, circuit, circuit_confidence, unit)
     values ($1, 0, 1, 'A', 'crank-vr', 1, 'V'), ($1, 1, 2, 'B', 'cam-hall', 1, 'V')`,
    [things.capture],
  );
  await pool.query(
    `insert into mark (id, capture_id, created_by, author, kind, signal, from_s, text)
     values ($1, $2, $3, $4, 'point', 0, 0.5, 'look here')`,
    [things.mark, things.capture, maker.id, maker.name],
  );
  const link = `insert into share_link (id, capture_id, created_by, secret_hash, question, may_answer, expires_at)
     values ($1, $2, $3, $4, 'What do you see?', $5, now() + interval '1 day')`;
  await pool.query(link, [things.shareLink, things.capture, maker.id, sha256(things.answerSecret), true]);
  await pool.query(link, [newId(), things.capture, maker.id, sha256(things.lookSecret), false]);
  await pool.query(
    `insert into answer (id, share_link_id, capture_id, name, text) values ($1, $2, $3, 'A colleague', 'The gap is odd.')`,
    [things.answer, things.shareLink, things.capture],
  );
  await pool.query(
    `insert into known_good (id, workshop_id, created_by, capture_id, make, model, condition, provenance, from_s, to_s, axis,
       engine_version, findings) values ($1, $2, $3, $4, 'Corvane', 'Talin', 'cranking', 'test', 0, 1, $5, '1', $6)`,
    [
      things.knownGood,
      workshopId,
      maker.id,
      things.capture,
      axis,
      JSON.stringify({ signals: [], relations: [], wheel: null }),
    ],
  );
  await pool.query(
    'insert into comparison (id, workshop_id, created_by, capture_id, request) values ($1, $2, $3, $4, $5)',
    [
      things.comparison,
      workshopId,
      maker.id,
      things.capture,
      JSON.stringify({
        signal: 0,
        asked: { signal: 0, knownGoodId: things.knownGood },
        knownGoodIds: [things.knownGood],
        otherCaptureId: null,
        otherSignal: null,
      }),
    ],
  );
  await makeTeaching(workshopId, maker, things);
  await pool.query(
    `insert into invitation (id, workshop_id, email, role, secret_hash, invited_by, expires_at)
     values ($1, $2, $3, 'learner', $4, $5, now() + interval '7 days')`,
    [things.invitation, workshopId, `${things.invitation}@people.example`, sha256(newSecret()), maker.id],
  );
  await pool.query(
    `insert into webhook (id, workshop_id, created_by, url, sealed_key, deleted_at)
     values ($1, $2, $3, 'https://receiver.example/', '', null)`,
    [things.webhook, workshopId, maker.id],
  );
  await makeJob(workshopId, maker, things);
  return things;
}

/** What an exercise asks and answers, with words that occur nowhere else. */
export const exerciseContent = (captureId: string) => ({
  question: 'Which cause fits?',
  facts: [{ label: 'Complaint', value: 'cranks, does not start' }],
  captureId,
  signals: [0],
  from: null,
  to: null,
  scales: false,
  asks: {
    stretch: null,
    circuit: null,
    cause: {
      choices: [
        { key: 'bent-tooth', text: 'Bent tooth', hint: '' },
        { key: 'wide-gap', text: 'Wide air gap', hint: '' },
      ],
      answer: 'bent-tooth',
    },
    value: null,
    text: null,
  },
  answer: {
    sentence: 'One tooth passes short, the zanzibar way.',
    evidence: [{ signal: 0, from: 0.4, to: 0.45, label: 'the zanzibar tooth' }],
    reasoning: [{ title: 'One or all?', text: 'Only one, says zanzibar.' }],
    proof: 'Seen bent, zanzibar.',
    caution: '',
  },
});

async function makeTeaching(workshopId: string, maker: Person, things: Things): Promise<void> {
  await pool.query(
    `insert into capture (id, workshop_id, created_by, title, status, samples_version, axis, samples, sha256, bytes, file_name,
       original_key) select $1, workshop_id, created_by, 'One short tooth', 'ready', 1, axis, 1000, $3, 10, 'short-tooth.csv', $4
     from capture where id = $2`,
    [
      things.exerciseCapture,
      things.capture,
      sha256(things.exerciseCapture),
      `captures/${things.exerciseCapture}/original`,
    ],
  );
  await pool.query(
    `insert into capture_signal (capture_id, index, "column", name, circuit, circuit_confidence, unit)
     values ($1, 0, 1, 'Short', 'crank-vr', 1, 'V'), ($1, 1, 2, 'B', 'cam-hall', 1, 'V')`,
    [things.exerciseCapture],
  );
  await pool.query(
    `insert into teaching_set (id, workshop_id, created_by, title, state, audience) values ($1, $2, $3, 'First steps', 'open', 'everyone')`,
    [things.set, workshopId, maker.id],
  );
  await pool.query(
    `insert into exercise (id, workshop_id, created_by, capture_id, capture_sha256, title, state)
     select $1, $2, $3, id, sha256, 'What is wrong?', 'open' from capture where id = $4`,
    [things.exercise, workshopId, maker.id, things.exerciseCapture],
  );
  await pool.query(
    'insert into exercise_version (exercise_id, version, content, samples_version) values ($1, 1, $2, 1)',
    [things.exercise, JSON.stringify(exerciseContent(things.exerciseCapture))],
  );
  await pool.query(
    `insert into teaching_set_item (id, set_id, position, kind, exercise_id) values ($1, $2, 0, 'exercise', $3)`,
    [newId(), things.set, things.exercise],
  );
  const other = await makePerson('Somebody else');
  await pool.query(
    `insert into attempt (id, exercise_id, person_id, version, answers, marks, outcome) values ($1, $2, $3, 1, $4, $5, 'waiting')`,
    [
      things.attempt,
      things.exercise,
      other.id,
      JSON.stringify({ text: 'It is bent.' }),
      JSON.stringify({ text: { mark: 'waiting', why: '' } }),
    ],
  );
}

async function makeJob(workshopId: string, maker: Person, { job, jobEntry, photo }: Things): Promise<void> {
  await pool.query(
    `insert into job (id, workshop_id, number, created_by, make, model, complaint)
     values ($1, $2, (random() * 1e9)::int, $3, 'Corvane', 'Talin', 'Cranks, does not start')`,
    [job, workshopId, maker.id],
  );
  await pool.query(
    `insert into job_entry (id, job_id, created_by, author, kind, text) values ($1, $2, $3, $4, 'note', 'smells of fuel')`,
    [jobEntry, job, maker.id, maker.name],
  );
  await pool.query(
    `insert into job_photo (id, job_id, created_by, author, content_type, width, height, bytes, sha256)
     values ($1, $2, $3, $4, 'image/jpeg', 4, 3, 10, 'ab')`,
    [photo, job, maker.id, maker.name],
  );
}

const store = new S3Client({
  endpoint: needed('S3_ENDPOINT'),
  region: process.env.S3_REGION ?? 'us-east-1',
  forcePathStyle: true,
  credentials: { accessKeyId: needed('S3_ACCESS_KEY_ID'), secretAccessKey: needed('S3_SECRET_ACCESS_KEY') },
});

/** Gives the capture its original and a thousand samples for each signal, and the photo its picture. */
export async function storeSamples(captureId: string, photoId = captureId): Promise<void> {
  const Bucket = process.env.S3_BUCKET ?? 'gapmark';
  const put = (name: string, Body: Uint8Array) =>
    store.send(new PutObjectCommand({ Bucket, Key: `captures/${captureId}/${name}`, Body }));
  await store.send(
    new PutObjectCommand({ Bucket, Key: `photos/${photoId}/whole`, Body: Buffer.from('a picture') }),
  );
  const samples = new Uint8Array(Float32Array.from({ length: 1000 }, (_, i) => Math.sin(i / 10)).buffer);
  await Promise.all([
    put('1/0.f32', samples),
    put('1/1.f32', samples),
    put('original', Buffer.from('time,A,B\n0,0,0\n')),
  ]);
}

/** Takes away the counts of tries of one address that tests come from: what other files count stays. */
export const forgetRatesOf = (address: string) =>
  pool.query("delete from rate_limit where key like '%:' || $1", [sha256(address).slice(0, 40)]);

/** The same for where requests come from unless a test says otherwise. */
export const forgetRates = () => forgetRatesOf('127.0.0.1');
