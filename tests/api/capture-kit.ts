import { readFile } from 'node:fs/promises';
import { setTimeout as sleep } from 'node:timers/promises';
import { type Answer, bearer, makeToken, makeWorkshop, origin, send, type Workshop } from './security-kit.ts';

/** What tests of uploads, captures and windows stand on: a workshop with a token, forms, and waiting for the worker. */
export interface Desk {
  readonly workshop: Workshop;
  readonly headers: Readonly<Record<string, string>>;
}

export async function makeDesk(): Promise<Desk> {
  const workshop = await makeWorkshop();
  const token = await makeToken(workshop.technician, workshop.id, ['read', 'write']);
  return { workshop, headers: bearer(token) };
}

/** A form's parts in the order given; a file is a Blob with its name. */
export type Part =
  | readonly [name: string, value: string]
  | readonly [name: string, value: Blob, fileName: string];

export async function postForm(
  headers: Readonly<Record<string, string>>,
  parts: readonly Part[],
): Promise<{ status: number; headers: Headers; json: ReturnType<typeof JSON.parse> }> {
  const form = new FormData();
  for (const [name, value, fileName] of parts) {
    if (typeof value === 'string') form.append(name, value);
    else form.append(name, value, fileName);
  }
  const answer = await fetch(new URL('/api/v1/captures', origin), { method: 'POST', headers, body: form });
  return { status: answer.status, headers: answer.headers, json: await answer.json() };
}

export const csv = (text: string, name = 'trace.csv'): Part => ['file', new Blob([text]), name];

/** An even trace of `rows` samples at 10 kHz: a sine of 5 V and 50 Hz beside a square wave of 0 and 5 V, four decimals. */
export function sampleCsv(rows: number): string {
  const lines = ['Time (s),Pick-up (V),Level (V)'];
  for (let i = 0; i < rows; i += 1) {
    const sine = (5 * Math.sin(i / 31.83)).toFixed(4);
    lines.push(`${(i / 10_000).toFixed(4)},${sine},${Math.floor(i / 50) % 2 === 0 ? 0 : 5}`);
  }
  return `${lines.join('\n')}\n`;
}

export async function uploadCsv(
  desk: Desk,
  text: string,
  fields: Record<string, string> = {},
): Promise<string> {
  const { status, json } = await postForm(desk.headers, [...Object.entries(fields), csv(text)]);
  if (status !== 201) throw new Error(`upload answered ${status}: ${JSON.stringify(json)}`);
  return json.id;
}

export const getCapture = (desk: Desk, id: string): Promise<Answer> =>
  send('GET', `/api/v1/captures/${id}`, { headers: desk.headers });

/** Waits until the worker has ended with a capture's present revision. */
export async function settled(desk: Desk, id: string, seconds = 60): Promise<Answer['json']> {
  for (const end = Date.now() + seconds * 1000; Date.now() < end; await sleep(100)) {
    const { json } = await getCapture(desk, id);
    if (['ready', 'failed', 'cancelled'].includes(json.status)) return json;
  }
  throw new Error(
    `capture ${id} did not come to an end in ${seconds} s: ${(await getCapture(desk, id)).text}`,
  );
}

export interface Window {
  readonly headers: Headers;
  readonly layout: string | null;
  readonly count: number;
  readonly times: Float64Array;
  readonly signals: readonly Float32Array[];
  readonly body: ArrayBuffer;
}

/** Fetches and decodes a window by what the OpenAPI text says of its layout. */
export async function getWindow(desk: Desk, id: string, query: string): Promise<Window> {
  const answer = await fetch(new URL(`/api/v1/captures/${id}/window?${query}`, origin), {
    headers: desk.headers,
  });
  const body = await answer.arrayBuffer();
  if (!answer.ok) throw new Error(`window answered ${answer.status}: ${Buffer.from(body).toString()}`);
  const { headers } = answer;
  const layout = headers.get('gapmark-layout');
  const count = Number(headers.get('gapmark-count'));
  const uneven = layout === 'samples' && headers.get('gapmark-axis') !== 'even';
  const each = layout === 'columns' ? count * 4 : count;
  const skip = uneven ? count * 8 : 0;
  const indices = (headers.get('gapmark-signals') ?? '').split(',').filter(Boolean);
  return {
    headers,
    layout,
    count,
    times: new Float64Array(body, 0, uneven ? count : 0),
    signals: indices.map((_, place) => new Float32Array(body, skip + place * each * 4, each)),
    body,
  };
}

/** A shared simulated capture, or null where the folder is absent. */
export async function simulated(name: string): Promise<string | null> {
  return readFile(new URL(`../../../shared/captures/${name}`, import.meta.url), 'utf8').catch(() => null);
}
