import { randomUUID } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import { ApiError } from '../server/errors.ts';
import { pinAddress } from '../server/http/address.ts';
import { securityHeaders } from '../server/http/headers.ts';
import { checkHost } from '../server/http/origin.ts';
import { log } from '../server/log.ts';
import { refuse } from './refuse.ts';
import { findRoute } from './routes.ts';

export type ServeStatic = (request: IncomingMessage, response: ServerResponse, path: string) => boolean;
export type Next = (requestId: string) => void;

/**
 * What happens to every request: an id, the true address, the headers that every answer carries, the host; then files, the
 * endpoints in front, and whatever comes next (Astro). Never throws.
 */
export function handle(
  request: IncomingMessage,
  response: ServerResponse,
  next: Next,
  serveStatic: ServeStatic = () => false,
): void {
  const requestId = randomUUID();
  const started = performance.now();
  let endpoint: string | undefined;
  response.on('close', () => {
    const { method } = request;
    const status = response.statusCode;
    const ms = Math.round(performance.now() - started);
    const line = { requestId, method, endpoint, status, ms, cut: !response.writableFinished };
    if (endpoint !== undefined) log.debug(line, 'answered');
  });
  try {
    const address = pinAddress(request.headers, request.socket.remoteAddress);
    request.headers['x-request-id'] = requestId;
    const url = new URL(request.url ?? '/', 'http://host');
    response.setHeader('X-Request-Id', requestId);
    for (const [name, value] of Object.entries(securityHeaders(url.pathname)))
      response.setHeader(name, value);
    checkHost(request.headers.host);
    if (serveStatic(request, response, url.pathname)) return;
    const found = findRoute(request.method ?? 'GET', url.pathname);
    if (found === null) {
      next(requestId);
      return;
    }
    if ('methods' in found) {
      response.setHeader('Allow', found.methods.join(', '));
      throw new ApiError('method_not_allowed');
    }
    endpoint = found.id;
    const header = (name: string) => {
      const value = request.headers[name];
      return Array.isArray(value) ? value.join(', ') : value;
    };
    found
      .run({ request, response, url, params: found.params, header, address, requestId })
      .catch((thrown: unknown) => refuse(request, response, thrown, { requestId, endpoint }));
  } catch (thrown) {
    refuse(request, response, thrown, { requestId, endpoint });
  }
}
