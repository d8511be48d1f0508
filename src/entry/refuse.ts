import type { IncomingMessage, ServerResponse } from 'node:http';
import { errorAnswer, toApiError } from '../server/http/respond.ts';
import { send } from './send.ts';

/** A refused body may go on arriving this long, so that the client reads the answer instead of a broken connection. */
const LINGER_MS = 3_000;
const LINGER_BYTES = 64 * 1024 * 1024;

/** Answers with what was thrown. When the body has not all arrived, the connection ends with the answer. */
export function refuse(
  request: IncomingMessage,
  response: ServerResponse,
  thrown: unknown,
  context: { readonly requestId?: string; readonly endpoint?: string } = {},
): void {
  const answer = errorAnswer(toApiError(thrown, context));
  if (request.complete || request.destroyed) {
    send(response, answer);
    return;
  }
  send(response, { ...answer, headers: { ...answer.headers, Connection: 'close' } });
  let bytes = 0;
  request.on('data', (chunk: Buffer) => {
    bytes += chunk.length;
    if (bytes > LINGER_BYTES) request.destroy();
  });
  request.on('error', () => {});
  request.resume();
  setTimeout(() => request.complete || request.destroy(), LINGER_MS).unref();
}
