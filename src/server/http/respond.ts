import { ApiError } from '../errors.ts';
import { log } from '../log.ts';
import { isServiceAway } from './service-away.ts';

/** An answer as plain data, for Astro's Response and for Node's ServerResponse alike. */
export interface PlainAnswer {
  readonly status: number;
  readonly headers: Record<string, string>;
  /** Empty for none. */
  readonly body: string;
}

/** How long to wait when the database or the store is away. */
const AWAY_RETRY_S = 3;

/** Whatever was thrown, as a refusal from the catalogue. What is not one is logged and told as `internal`, without details. */
export function toApiError(
  thrown: unknown,
  context: { requestId?: string; endpoint?: string } = {},
): ApiError {
  if (thrown instanceof ApiError) return thrown;
  if (isServiceAway(thrown)) {
    log.warn({ ...context, err: summary(thrown) }, 'a service is away');
    return new ApiError('service_away', { retryAfterS: AWAY_RETRY_S, cause: thrown });
  }
  log.error({ ...context, err: summary(thrown) }, 'unexpected fault');
  return new ApiError('internal', { cause: thrown });
}

/** For the log: name, code, first line and stack. A query's parameters stay out, as they may hold what users typed. */
function summary(thrown: unknown): Record<string, unknown> {
  if (!(thrown instanceof Error)) return { type: typeof thrown };
  const root = deepest(thrown);
  return {
    name: root.name,
    code: 'code' in root ? root.code : undefined,
    message: root.message.split('\n')[0],
    stack: thrown.stack
      ?.split('\n')
      .filter((line) => line.startsWith('    at '))
      .slice(0, 12),
  };
}

function deepest(error: Error): Error {
  let current = error;
  for (let depth = 0; depth < 6 && current.cause instanceof Error; depth += 1) current = current.cause;
  return current;
}

/** The refusal in the API's error shape. */
export function errorAnswer(error: ApiError): PlainAnswer {
  const headers: Record<string, string> = {
    'Content-Type': 'application/json; charset=utf-8',
    'Cache-Control': 'no-store',
  };
  if (error.retryAfterS !== undefined)
    headers['Retry-After'] = String(Math.max(1, Math.ceil(error.retryAfterS)));
  if (error.status === 401) headers['WWW-Authenticate'] = 'Bearer realm="gapmark"';
  return { status: error.status, headers, body: JSON.stringify(error.toBody()) };
}

/** For Astro. */
export function toResponse(answer: PlainAnswer): Response {
  return new Response(answer.body === '' ? null : answer.body, {
    status: answer.status,
    headers: answer.headers,
  });
}

/** Any thrown thing as a Response. */
export const refuse = (thrown: unknown, context: { requestId?: string; endpoint?: string } = {}): Response =>
  toResponse(errorAnswer(toApiError(thrown, context)));
