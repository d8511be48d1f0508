import type { ServerResponse } from 'node:http';
import type { PlainAnswer } from '../server/http/respond.ts';

/** Sends an answer; nothing is sent when one is on its way already. */
export function send(response: ServerResponse, answer: PlainAnswer): void {
  if (response.headersSent || response.destroyed) {
    response.destroy();
    return;
  }
  const body = Buffer.from(answer.body);
  response.writeHead(answer.status, { ...answer.headers, 'Content-Length': body.length });
  response.end(response.req.method === 'HEAD' ? undefined : body);
}
