import { readFile } from 'node:fs/promises';
import { basename } from 'node:path';
import { z } from 'zod';
import { CAPTURE_STATUSES } from '../../contract/areas/captures.ts';

const made = z.object({ id: z.string() });
const listed = z.object({
  items: z.array(z.object({ id: z.string(), title: z.string(), status: z.enum(CAPTURE_STATUSES) })),
  nextCursor: z.string().nullable(),
});
const state = z.object({
  status: z.enum(CAPTURE_STATUSES),
  error: z.object({ message: z.string() }).optional(),
});

const POLL_MS = 150;
const LONGEST_WAIT_MS = 180_000;

/** The API as one person uses it, for seeding: everything goes through the same doors as anybody's. */
export class DemoClient {
  constructor(
    private readonly origin: string,
    private readonly token: string,
  ) {}

  async call(method: string, path: string, body?: unknown): Promise<unknown> {
    const response = await fetch(`${this.origin}/api/v1${path}`, {
      method,
      headers: {
        Authorization: `Bearer ${this.token}`,
        ...(body === undefined ? {} : { 'Content-Type': 'application/json' }),
      },
      body: body === undefined ? null : JSON.stringify(body),
      signal: AbortSignal.timeout(60_000),
    });
    const text = await response.text();
    if (!response.ok) throw new Error(`${method} ${path} answered ${response.status}: ${text.slice(0, 300)}`);
    return text === '' ? null : JSON.parse(text);
  }

  async make(path: string, body: unknown): Promise<string> {
    return made.parse(await this.call('POST', path, body)).id;
  }

  async captures() {
    return listed.parse(await this.call('GET', '/captures?limit=100')).items;
  }

  /** Uploads a file as a form would. */
  async upload(file: string, title: string, cylinders: number): Promise<string> {
    return this.uploadText(await readFile(file), basename(file), { title, cylinders: String(cylinders) });
  }

  /** Uploads what a file would hold. */
  async uploadText(
    content: string | Uint8Array,
    name: string,
    fields: Readonly<Record<string, string>>,
  ): Promise<string> {
    const form = new FormData();
    for (const [field, value] of Object.entries(fields)) form.set(field, value);
    const part = typeof content === 'string' ? content : new Uint8Array(content);
    form.set('file', new File([part], name, { type: 'text/csv' }));
    const response = await fetch(`${this.origin}/api/v1/captures`, {
      method: 'POST',
      headers: { Authorization: `Bearer ${this.token}` },
      body: form,
      signal: AbortSignal.timeout(60_000),
    });
    if (!response.ok) throw new Error(`Uploading ${name} answered ${response.status}`);
    return made.parse(await response.json()).id;
  }

  /** Waits until a capture is measured. @throws when it fails or takes longer than three minutes. */
  async untilReady(id: string): Promise<void> {
    const end = Date.now() + LONGEST_WAIT_MS;
    while (Date.now() < end) {
      const { status, error } = state.parse(await this.call('GET', `/captures/${id}`));
      if (status === 'ready') return;
      if (status === 'failed' || status === 'cancelled')
        throw new Error(`Capture ${id} ${status}: ${error?.message}`);
      await new Promise((resolve) => setTimeout(resolve, POLL_MS));
    }
    throw new Error(`Capture ${id} was not measured within three minutes`);
  }
}
