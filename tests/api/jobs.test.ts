import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Desk, getCapture, makeDesk, sampleCsv, settled, uploadCsv } from './capture-kit.ts';
import { makeThings, makeWorkshop, pool, send } from './security-kit.ts';

let desk: Desk;
beforeAll(async () => {
  desk = await makeDesk();
});
afterAll(() => pool.end());

type Headers = Readonly<Record<string, string>>;
const call = (method: string, path: string, body?: unknown, headers: Headers = {}) =>
  send(method, `/api/v1${path}`, { headers: { ...desk.headers, ...headers }, body });
const open = async (body: Record<string, unknown> = {}) => {
  const answer = await call('POST', '/jobs', { complaint: 'Cranks, does not start', ...body });
  expect(answer.status, answer.text).toBe(201);
  return answer.json;
};
const found = async (search: string): Promise<string[]> => {
  const { json } = await call('GET', `/jobs?search=${encodeURIComponent(search)}`);
  return json.items.map((item: { id: string }) => item.id);
};

const VEHICLE = {
  make: 'Aldane',
  model: 'Sorrel 1.6',
  year: 2011,
  engine: 'AS16, petrol, port injection',
  vin: '1g4ah59h45g118341',
  plate: 'KV 418 T',
  cylinders: 4,
};

describe('POST /jobs', () => {
  it('opens a job with the next number of the workshop, for the caller, and gives it back by id', async () => {
    const first = await open({ vehicle: VEHICLE, codes: ['P0336', 'x-made-up'] });
    const second = await open();
    expect(second.number).toBe(first.number + 1);
    expect(first).toMatchObject({
      vehicle: { ...VEHICLE, vin: '1G4AH59H45G118341' },
      vinWarning: null,
      codes: ['P0336', 'x-made-up'],
      state: 'open',
      assignee: { name: 'Test technician' },
      outcome: null,
      closedAt: null,
    });
    const got = await call('GET', `/jobs/${first.id}`);
    expect(got.json).toEqual(first);
    expect(got.headers.etag).toBe(first.etag);
  });

  it('gives each of ten that come at once its own number', async () => {
    const made = await Promise.all(Array.from({ length: 10 }, () => open()));
    expect(new Set(made.map((job) => job.number)).size).toBe(10);
  });

  it('warns about a VIN whose check digit does not fit, and keeps it', async () => {
    const job = await open({ vehicle: { vin: '1G4AH59H55G118341' } });
    expect(job.vehicle.vin).toBe('1G4AH59H55G118341');
    expect(job.vinWarning).toContain('would be 4');
    expect((await open({ vehicle: { vin: 'SHORT1' } })).vinWarning).toContain('17');
  });

  it('names each field that needs attention', async () => {
    const answer = await call('POST', '/jobs', { complaint: ' ', vehicle: { year: 1850, cylinders: 0 } });
    expect(answer.status).toBe(422);
    const paths = answer.json.error.details.map((detail: { path: string }) => detail.path).sort();
    expect(paths).toEqual(['complaint', 'vehicle.cylinders', 'vehicle.year']);
  });

  it('takes nobody from outside and no learner as the one who works on it', async () => {
    const other = await makeWorkshop();
    for (const assigneeId of [other.owner.id, desk.workshop.learner.id, 'aaaaaaaaaaaaaaaaaaaa']) {
      const answer = await call('POST', '/jobs', { complaint: 'x', assigneeId });
      expect(answer.status).toBe(422);
      expect(answer.json.error.details[0].path).toBe('assigneeId');
    }
  });
});

describe('GET /jobs', () => {
  it('finds a job by each thing that belongs to it, whatever the case, and by several words together', async () => {
    const mark = Math.random().toString(36).slice(2, 10);
    const job = await open({
      vehicle: { ...VEHICLE, make: `Make${mark}`, plate: `ZQ ${mark} 7` },
      complaint: `Stalls ${mark}when hot`,
      codes: [`P1${mark}`],
    });
    await call('POST', `/jobs/${job.id}/entries`, { kind: 'note', text: `Smells of ${mark}note` });
    await call('POST', `/jobs/${job.id}/entries`, {
      kind: 'reading',
      what: `Rail ${mark}reading`,
      value: 3.1,
      unit: 'bar',
    });
    await uploadCsv(desk, sampleCsv(20), { title: `Crank ${mark}capture`, jobId: job.id });
    const words = [
      `make${mark}`,
      `${mark}when`,
      `p1${mark}`,
      `zq-${mark}-7`,
      `ZQ${mark}7`,
      `${mark}note`,
      `${mark}reading`,
      `${mark}capture`,
      `sorrel make${mark} 2011`,
      `J-${String(job.number).padStart(4, '0')} ${mark}`,
    ];
    for (const word of words) expect(await found(word), word).toEqual([job.id]);
    expect(await found(`make${mark} nowhere-${mark}`)).toEqual([]);
    expect(await found(`%${mark}`)).toEqual([]);
  });

  it('pages newest first without leaving out or repeating one', async () => {
    const fresh = await makeDesk();
    for (let k = 0; k < 5; k += 1)
      await send('POST', '/api/v1/jobs', { headers: fresh.headers, body: { complaint: `Job ${k}` } });
    const numbers: number[] = [];
    let cursor = '';
    do {
      const { json } = await send('GET', `/api/v1/jobs?limit=2${cursor}`, { headers: fresh.headers });
      numbers.push(...json.items.map((item: { number: number }) => item.number));
      cursor = json.nextCursor === null ? '' : `&cursor=${json.nextCursor}`;
    } while (cursor !== '');
    expect(numbers).toEqual([5, 4, 3, 2, 1]);
  });

  it('filters by state and by who works on it, and shows nothing of other workshops', async () => {
    const mine = await open();
    const handed = await open({ assigneeId: desk.workshop.owner.id });
    const ids = async (query: string) =>
      (await call('GET', `/jobs?limit=100&${query}`)).json.items.map((item: { id: string }) => item.id);
    expect(await ids('assignee=me')).toContain(mine.id);
    expect(await ids('assignee=me')).not.toContain(handed.id);
    expect(await ids(`assignee=${desk.workshop.owner.id}`)).toEqual([handed.id]);
    expect(await ids('state=closed')).not.toContain(mine.id);
    const other = await makeWorkshop();
    const theirs = await makeThings(other.id, other.owner);
    expect(await ids('')).not.toContain(theirs.job);
  });
});

describe('PATCH /jobs/{id}', () => {
  it('changes only the vehicle fields named', async () => {
    const job = await open({ vehicle: VEHICLE });
    const { json } = await call('PATCH', `/jobs/${job.id}`, { vehicle: { plate: 'KV 419 T' } });
    expect(json.vehicle).toEqual({ ...job.vehicle, plate: 'KV 419 T' });
    expect(json.etag).not.toBe(job.etag);
  });

  it('is 412 for an edition that somebody changed meanwhile, and keeps theirs', async () => {
    const job = await open();
    const ifMatch = { 'if-match': job.etag };
    expect((await call('PATCH', `/jobs/${job.id}`, { complaint: 'first' }, ifMatch)).status).toBe(200);
    const late = await call('PATCH', `/jobs/${job.id}`, { complaint: 'second' }, ifMatch);
    expect(late.status).toBe(412);
    expect(late.json.error.message).toContain('Somebody changed this');
    expect((await call('GET', `/jobs/${job.id}`)).json.complaint).toBe('first');
  });

  it('notes a hand-over with the name, and refuses a hand-over to a learner', async () => {
    const job = await open();
    const to = desk.workshop.instructor.id;
    const { json } = await call('PATCH', `/jobs/${job.id}`, { assigneeId: to });
    expect(json.assignee).toEqual({ id: to, name: 'Test instructor' });
    const { json: line } = await call('GET', `/jobs/${job.id}/timeline`);
    const texts = line.items.map((item: { entry?: { text: string } }) => item.entry?.text);
    expect(texts).toEqual(['Opened', 'Handed to Test instructor']);
    const refused = await call('PATCH', `/jobs/${job.id}`, { assigneeId: desk.workshop.learner.id });
    expect(refused.status).toBe(422);
  });
});

describe('closing a job', () => {
  const cause = {
    cause: 'Bent tooth on the trigger wheel',
    part: 'Trigger wheel',
    proof: '58 regular teeth after',
  };

  it('needs a cause, or a note that says why there is none', async () => {
    const job = await open();
    const bare = await call('PATCH', `/jobs/${job.id}`, { state: 'closed' });
    expect(bare.status).toBe(422);
    expect(bare.json.error.details[0].path).toBe('outcome.cause');
    const closed = await call('PATCH', `/jobs/${job.id}`, {
      state: 'closed',
      outcome: { note: 'Customer took it away' },
    });
    expect(closed.status).toBe(200);
    expect(closed.json).toMatchObject({ state: 'closed', closedBy: { name: 'Test technician' } });
    expect(closed.json.outcome).toEqual({ cause: '', part: '', proof: '', note: 'Customer took it away' });
  });

  it('lets one of two who close it at once win; the other reads 409 with the name, and changes nothing', async () => {
    const job = await open();
    const answers = await Promise.all(
      ['A', 'B'].map((letter) =>
        call('PATCH', `/jobs/${job.id}`, { state: 'closed', outcome: { ...cause, note: letter } }),
      ),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const lost = answers.find(({ status }) => status === 409);
    expect(lost?.json.error.message).toBe(
      'Test technician closed this job already. Their outcome stands; yours was not kept.',
    );
    const won = answers.find(({ status }) => status === 200);
    expect((await call('GET', `/jobs/${job.id}`)).json.outcome).toEqual(won?.json.outcome);
  });

  it('is 412 for the second of two who both opened the same edition', async () => {
    const job = await open();
    const answers = await Promise.all(
      ['A', 'B'].map((note) =>
        call(
          'PATCH',
          `/jobs/${job.id}`,
          { state: 'closed', outcome: { ...cause, note } },
          { 'if-match': job.etag },
        ),
      ),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 412]);
  });

  it('can be undone: open again has no closing date, and the timeline and the audit list say so', async () => {
    const job = await open();
    await call('PATCH', `/jobs/${job.id}`, { state: 'closed', outcome: cause });
    const { json } = await call('PATCH', `/jobs/${job.id}`, { state: 'open' });
    expect(json).toMatchObject({
      state: 'open',
      closedAt: null,
      closedBy: null,
      outcome: { cause: cause.cause },
    });
    const { json: line } = await call('GET', `/jobs/${job.id}/timeline`);
    expect(line.items.map((item: { entry: { text: string } }) => item.entry.text)).toEqual([
      'Opened',
      'Closed',
      'Open again',
    ]);
    const { rows } = await pool.query(
      'select action from audit where workshop_id = $1 and subject = $2 order by at',
      [desk.workshop.id, `J-${String(job.number).padStart(4, '0')}`],
    );
    expect(rows.map((row) => row.action)).toEqual(['job opened', 'job closed', 'job opened again']);
  });
});

describe('deleting a job', () => {
  it('hides it and brings it back with everything; its captures stay', async () => {
    const job = await open();
    const capture = await uploadCsv(desk, sampleCsv(20), { jobId: job.id });
    await call('POST', `/jobs/${job.id}/entries`, { kind: 'note', text: 'Kept' });
    expect((await call('DELETE', `/jobs/${job.id}`, undefined, { 'if-match': '"99"' })).status).toBe(412);
    expect((await call('DELETE', `/jobs/${job.id}`, undefined, { 'if-match': job.etag })).status).toBe(204);
    expect((await call('GET', `/jobs/${job.id}`)).status).toBe(404);
    expect((await getCapture(desk, capture)).status).toBe(200);
    expect((await call('POST', `/jobs/${job.id}/restore`)).status).toBe(200);
    const { json } = await call('GET', `/jobs/${job.id}/timeline`);
    expect(json.items.map((item: { type: string }) => item.type)).toEqual(['entry', 'capture', 'entry']);
  });

  it('is for technicians only where they opened it themselves', async () => {
    const { workshop } = desk;
    const ofOwner = await send('POST', '/api/v1/jobs', {
      headers: workshop.owner.browser,
      body: { complaint: 'x' },
    });
    const path = `/api/v1/jobs/${ofOwner.json.id}`;
    expect((await send('DELETE', path, { headers: workshop.technician.browser })).status).toBe(403);
    expect((await send('DELETE', path, { headers: workshop.instructor.browser })).status).toBe(204);
  });

  it('ends a job for good after 30 days', async () => {
    const job = await open();
    await call('DELETE', `/jobs/${job.id}`);
    await pool.query("update job set deleted_at = now() - interval '31 days' where id = $1", [job.id]);
    expect((await call('POST', `/jobs/${job.id}/restore`)).status).toBe(404);
  });
});

describe('a learner', () => {
  it('has no part in jobs: not in the list, not by id, not through a capture', async () => {
    const { learner, technician } = desk.workshop;
    const job = await open();
    const headers = learner.browser;
    expect((await send('GET', '/api/v1/jobs', { headers })).status).toBe(403);
    expect((await send('GET', `/api/v1/jobs/${job.id}`, { headers })).status).toBe(404);
    expect((await send('GET', `/api/v1/jobs/${job.id}/timeline`, { headers })).status).toBe(404);
    const practice = await makeThings(desk.workshop.id, learner, { practice: true });
    const link = { headers, body: { jobId: job.id } };
    const answer = await send('PATCH', `/api/v1/captures/${practice.capture}`, link);
    expect(answer.status).toBe(422);
    expect((await send('GET', `/api/v1/jobs/${job.id}`, { headers: technician.browser })).status).toBe(200);
  });
});

describe('notes and readings', () => {
  it('are added, changed with If-Match, taken away and brought back', async () => {
    const job = await open();
    const reading = { kind: 'reading', what: 'Battery at rest', value: 12.4, unit: 'V' };
    const made = await call('POST', `/jobs/${job.id}/entries`, reading);
    expect(made.status).toBe(201);
    expect(made.json).toMatchObject({ ...reading, by: 'Test technician' });
    const path = `/job-entries/${made.json.id}`;
    const changed = await call('PATCH', path, { value: 12.6 }, { 'if-match': made.json.etag });
    expect(changed.json).toMatchObject({ value: 12.6, unit: 'V', what: 'Battery at rest' });
    expect((await call('PATCH', path, { value: 1 }, { 'if-match': made.json.etag })).status).toBe(412);
    expect((await call('DELETE', path)).status).toBe(204);
    const line = async () => (await call('GET', `/jobs/${job.id}/timeline`)).json.items.length;
    expect(await line()).toBe(1);
    expect((await call('POST', `${path}/restore`)).json.value).toBe(12.6);
    expect(await line()).toBe(2);
  });

  it('take no empty note, no reading without a number, and no value on a note', async () => {
    const job = await open();
    const add = async (body: unknown) => (await call('POST', `/jobs/${job.id}/entries`, body)).status;
    expect(await add({ kind: 'note', text: '  ' })).toBe(422);
    expect(await add({ kind: 'reading', what: 'Rail', value: '3,1' })).toBe(422);
    expect(await add({ kind: 'event', text: 'Closed' })).toBe(422);
    const note = await call('POST', `/jobs/${job.id}/entries`, { kind: 'note', text: 'n' });
    expect((await call('PATCH', `/job-entries/${note.json.id}`, { value: 3 })).status).toBe(422);
  });

  it('leave alone what the product noted by itself', async () => {
    const job = await open();
    const { json } = await call('GET', `/jobs/${job.id}/timeline`);
    const { id } = json.items[0].entry;
    expect((await call('PATCH', `/job-entries/${id}`, { text: 'never happened' })).status).toBe(409);
    expect((await call('DELETE', `/job-entries/${id}`)).status).toBe(409);
  });
});

describe('captures of a job', () => {
  it('are linked by the form and by PATCH, listed with jobId, and let go again', async () => {
    const job = await open();
    const first = await uploadCsv(desk, sampleCsv(20), { jobId: job.id });
    const second = await uploadCsv(desk, sampleCsv(20));
    await settled(desk, second);
    expect((await call('PATCH', `/captures/${second}`, { jobId: job.id })).json.jobId).toBe(job.id);
    const listed = async () =>
      (await call('GET', `/captures?jobId=${job.id}`)).json.items.map((item: { id: string }) => item.id);
    expect(await listed()).toEqual([second, first]);
    expect((await call('PATCH', `/captures/${first}`, { jobId: null })).json.jobId).toBeNull();
    expect(await listed()).toEqual([second]);
  });

  it('are linked to no job of another workshop and to no hidden one, in form and resumable upload alike', async () => {
    const other = await makeWorkshop();
    const theirs = await makeThings(other.id, other.owner);
    const hidden = await open();
    await call('DELETE', `/jobs/${hidden.id}`);
    for (const jobId of [theirs.job, hidden.id]) {
      await expect(uploadCsv(desk, sampleCsv(20), { jobId })).rejects.toThrow('there is no such job');
      const begun = await beginUpload(jobId);
      expect(begun.status).toBe(422);
      expect(begun.json.error.details[0].path).toBe('jobId');
    }
  });

  it('belong to the job from the first byte of a resumable upload; a job hidden on the way costs nobody the file', async () => {
    const kept = await open();
    const gone = await open();
    const ids = new Map<string, string>();
    for (const job of [kept, gone]) {
      const begun = await beginUpload(job.id);
      expect(begun.status).toBe(201);
      ids.set(job.id, begun.headers.location ?? '');
    }
    await call('DELETE', `/jobs/${gone.id}`);
    for (const [jobId, location] of ids) {
      const sent = await send('PATCH', location, {
        headers: {
          ...desk.headers,
          'tus-resumable': '1.0.0',
          'upload-offset': '0',
          'content-type': 'application/offset+octet-stream',
        },
        body: TEXT,
      });
      expect(sent.status).toBe(204);
      const { json } = await getCapture(desk, String(sent.headers['gapmark-capture']));
      expect(json.jobId).toBe(jobId === kept.id ? kept.id : null);
    }
  });
});

const TEXT = 'time,A\n0,1\n0.001,2\n';

function beginUpload(jobId: string) {
  const pair = (key: string, value: string) => `${key} ${Buffer.from(value).toString('base64')}`;
  return send('POST', '/api/v1/uploads', {
    headers: {
      ...desk.headers,
      'tus-resumable': '1.0.0',
      'upload-length': String(TEXT.length),
      'upload-metadata': [pair('filename', 'a.csv'), pair('jobId', jobId)].join(','),
    },
  });
}
