import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Desk, makeDesk, sampleCsv, settled, uploadCsv } from './capture-kit.ts';
import { origin, pool, send } from './security-kit.ts';

const TYPED = '"><script>alert(1)</script> & <b>bold</b>';

let desk: Desk;
let id: string;
beforeAll(async () => {
  desk = await makeDesk();
  await pool.query("update workshop set time_zone = 'Pacific/Kiritimati', name = $2 where id = $1", [
    desk.workshop.id,
    TYPED,
  ]);
  const text = (name: string, max = 500) => `${name} ${TYPED}`.slice(0, max);
  const made = await call('POST', '/jobs', {
    complaint: text('Complaint'),
    vehicle: {
      make: text('Make', 80),
      model: text('Model', 80),
      engine: text('Engine'),
      plate: '<i>PLATE</i>',
      vin: '<u>VIN</u>',
    },
    codes: ['<s>P0336</s>'],
  });
  id = made.json.id;
  await call('POST', `/jobs/${id}/entries`, { kind: 'note', text: text('Note') });
  await call('POST', `/jobs/${id}/entries`, {
    kind: 'reading',
    what: text('What'),
    value: 12.4,
    unit: '<V>',
    text: text('How'),
  });
  const capture = await uploadCsv(desk, sampleCsv(2_000), { title: text('Title', 200), jobId: id });
  await settled(desk, capture);
  await call('POST', `/captures/${capture}/marks`, {
    kind: 'point',
    signal: 0,
    from: 0.001,
    to: null,
    value: null,
    text: text('Mark'),
  });
  const form = new FormData();
  form.set('caption', text('Caption'));
  const photo = await sharp({ create: { width: 60, height: 40, channels: 3, background: '#0b6b6b' } })
    .png()
    .toBuffer();
  form.set('file', new File([new Uint8Array(photo)], 'a.png'));
  await fetch(`${origin}/api/v1/jobs/${id}/photos`, { method: 'POST', headers: desk.headers, body: form });
  await call('PATCH', `/jobs/${id}`, {
    state: 'closed',
    outcome: { cause: text('Cause'), part: text('Part'), proof: text('Proof'), note: text('Remark') },
  });
  await pool.query("update job set created_at = '2026-05-14T21:30:00Z' where id = $1", [id]);
});
afterAll(() => pool.end());

const call = (method: string, path: string, body?: unknown) =>
  send(method, `/api/v1${path}`, { headers: desk.headers, body });

async function pdf(whom: string): Promise<Uint8Array> {
  const answer = await fetch(`${origin}/api/v1/jobs/${id}/report?for=${whom}&format=pdf`, {
    headers: desk.headers,
  });
  expect(answer.status).toBe(200);
  expect(answer.headers.get('content-type')).toBe('application/pdf');
  return new Uint8Array(await answer.arrayBuffer());
}

interface Node {
  readonly role?: string;
  readonly alt?: string;
  readonly children?: readonly Node[];
}

async function read(bytes: Uint8Array) {
  const document = await getDocument({ data: bytes.slice(), verbosity: 0 }).promise;
  let text = '';
  const nodes: Node[] = [];
  const gather = (node: Node | null) => {
    if (node === null) return;
    nodes.push(node);
    for (const child of node.children ?? []) gather(child);
  };
  for (let page = 1; page <= document.numPages; page += 1) {
    const sheet = await document.getPage(page);
    const { items } = await sheet.getTextContent();
    text += items.map((item) => ('str' in item ? item.str : '')).join(' ');
    gather((await sheet.getStructTree()) as Node | null);
  }
  const { info } = (await document.getMetadata()) as unknown as { info: Record<string, unknown> };
  const marked = await document.getMarkInfo();
  return { pages: document.numPages, text: text.replace(/\s+/g, ' '), nodes, info, marked };
}

describe('GET /jobs/{id}/report', () => {
  it.each(['customer', 'colleague'])(
    'writes what people typed as text for a %s, never as markup',
    async (whom) => {
      const { text, status, headers } = await call('GET', `/jobs/${id}/report?for=${whom}`);
      expect(status).toBe(200);
      expect(text).not.toMatch(/<script|<b>|<i>|<u>|<s>|<V>/);
      expect(text).toContain('Cause &quot;&gt;&lt;script&gt;');
      expect(text).not.toMatch(/ style="/);
      expect(headers['content-security-policy']).toMatch(/default-src 'none'.*style-src 'sha256-/);
    },
  );

  it('tells times in the workshop’s zone', async () => {
    // 21:30 in UTC is 11:30 of the next day where the workshop is.
    const { text } = await call('GET', `/jobs/${id}/report`);
    expect(text).toContain('15 May 2026, 11:30');
  });

  it('gives a colleague the notes, and a customer plain words', async () => {
    const colleague = await call('GET', `/jobs/${id}/report?for=colleague`);
    const customer = await call('GET', `/jobs/${id}/report?for=customer`);
    expect(colleague.text).toContain('Note &quot;');
    expect(customer.text).not.toContain('Note &quot;&gt;&lt;script');
    expect(customer.text).toContain('What was wrong');
    for (const { text } of [colleague, customer]) expect(text).toContain('it certifies nothing');
  });

  it('gives the same bytes for the same job, in HTML and PDF', async () => {
    expect(Buffer.from(await pdf('colleague')).equals(Buffer.from(await pdf('colleague')))).toBe(true);
    const page = async () => (await call('GET', `/jobs/${id}/report`)).text;
    expect(await page()).toBe(await page());
  });

  it('is a tagged PDF with real text, title, headings, header cells, and figures with alternative text', async () => {
    const { text, nodes, info, marked, pages } = await read(await pdf('colleague'));
    expect(pages).toBeLessThanOrEqual(4);
    expect(marked?.Marked).toBe(true);
    expect(info.Title).toContain('Cause');
    expect(info.Language).toBe('en-GB');
    for (const word of [
      'Complaint',
      '<i>PLATE</i>',
      '<U>VIN</U>',
      '<s>P0336</s>',
      '12.4 <V>',
      'Proof',
      'certifies nothing',
    ])
      expect(text).toContain(word);
    const roles = nodes.map((node) => node.role);
    for (const role of ['H1', 'H2', 'P', 'Table', 'TR', 'TH', 'TD', 'Figure', 'L', 'LI'])
      expect(roles).toContain(role);
    const figures = nodes.filter((node) => node.role === 'Figure');
    expect(figures.length).toBeGreaterThanOrEqual(2);
    for (const figure of figures) expect(figure.alt).toMatch(/Trace of|Caption/);
  });

  it('embeds its fonts and draws traces as paths, not as a picture', async () => {
    const bytes = Buffer.from(await pdf('colleague')).toString('latin1');
    expect(bytes).toMatch(/\/FontFile2/);
    expect(bytes).not.toMatch(/\/BaseFont \/(Helvetica|Times|Courier)/);
    // The one picture is the photo.
    expect(bytes.match(/\/Subtype \/Image/g)).toHaveLength(1);
  });

  it('is closed to learners and to other workshops', async () => {
    const path = `/api/v1/jobs/${id}/report?format=pdf`;
    expect((await send('GET', path, { headers: desk.workshop.learner.browser })).status).toBe(404);
    expect((await send('GET', path, { headers: { origin } })).status).toBe(401);
    const other = await makeDesk();
    expect((await send('GET', path, { headers: other.headers })).status).toBe(404);
  });
});
