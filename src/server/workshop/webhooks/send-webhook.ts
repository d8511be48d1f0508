import { request as httpRequest } from 'node:http';
import { request as httpsRequest } from 'node:https';
import { checkAddress, isExcepted } from './check-address.ts';
import { AddressRefused, checkedLookup, type Resolve } from './checked-lookup.ts';
import { signature } from './sign.ts';

const WAIT_MS = 10_000;
const ANSWER_BYTES = 64 * 1024;

export interface Message {
  readonly url: string;
  readonly key: string;
  /** The same at every try, so that a receiver can tell a repeat. */
  readonly id: string;
  readonly event: string;
  readonly body: string;
}

export interface Outcome {
  readonly delivered: boolean;
  /** Null when no answer came. */
  readonly status: number | null;
  /** A sentence for the log that the owner reads. */
  readonly error: string | null;
}

interface Surroundings {
  readonly resolve?: Resolve;
  readonly allowed?: readonly string[];
}

const failed = (error: string, status: number | null = null): Outcome => ({
  delivered: false,
  status,
  error,
});

/** Sends one message and says what became of it. Never throws, follows no redirect, and waits ten seconds at most. */
export async function sendWebhook(
  message: Message,
  { resolve, allowed }: Surroundings = {},
): Promise<Outcome> {
  try {
    const url = checkAddress(message.url, allowed);
    const status = await post(url, message, isExcepted(url, allowed) ? undefined : checkedLookup(resolve));
    if (status >= 200 && status < 300) return { delivered: true, status, error: null };
    if (status >= 300 && status < 400)
      return failed('It answered with a redirect, which is not followed. Enter the final address.', status);
    return failed(`It answered ${status}.`, status);
  } catch (error) {
    return failed(wordsFor(error));
  }
}

function wordsFor(error: unknown): string {
  if (error instanceof AddressRefused)
    return /inward$/.test(error.message)
      ? 'Its name points inward, to this machine or its network.'
      : error.message;
  if (error instanceof Error && (error.name === 'TimeoutError' || error.name === 'AbortError'))
    return 'It did not answer within ten seconds.';
  const code = error instanceof Error && 'code' in error ? String(error.code) : '';
  if (code === 'ENOTFOUND' || code === 'EAI_AGAIN') return 'Its name is not known.';
  if (code === 'ECONNREFUSED') return 'It took no connection.';
  return `It could not be reached${code === '' ? '' : ` (${code})`}.`;
}

/** Gives the answer's status; its body is read only so far as the limit and never looked at. */
function post(
  url: URL,
  message: Message,
  lookup: ReturnType<typeof checkedLookup> | undefined,
): Promise<number> {
  const timeS = Math.floor(Date.now() / 1000);
  const body = Buffer.from(message.body, 'utf8');
  const send = url.protocol === 'https:' ? httpsRequest : httpRequest;
  return new Promise((resolve, reject) => {
    const outgoing = send(url, {
      method: 'POST',
      agent: false,
      ...(lookup === undefined ? {} : { lookup }),
      signal: AbortSignal.timeout(WAIT_MS),
      headers: {
        'Content-Type': 'application/json; charset=utf-8',
        'Content-Length': body.byteLength,
        'User-Agent': 'Gapmark',
        'Gapmark-Event': message.event,
        'Gapmark-Delivery': message.id,
        'Gapmark-Time': String(timeS),
        'Gapmark-Signature': signature(message.key, timeS, message.body),
      },
    });
    outgoing.on('error', reject);
    outgoing.on('response', (answer) => {
      const status = answer.statusCode ?? 0;
      let bytes = 0;
      answer.on('data', (chunk: Buffer) => {
        bytes += chunk.byteLength;
        if (bytes > ANSWER_BYTES) answer.destroy();
      });
      answer.on('error', () => {});
      answer.on('close', () => resolve(status));
    });
    outgoing.end(body);
  });
}
