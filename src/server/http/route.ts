import type { APIRoute } from 'astro';
import type { z } from 'zod';
import type { Endpoint, Thing } from '../../contract/endpoint.ts';
import { ENDPOINTS, type EndpointId } from '../../contract/endpoints.ts';
import { accessOf, authorize, type Caller, OPENERS, type Opened } from '../access.ts';
import { shareCaller } from '../captures/sharing/share-caller.ts';
import { ApiError } from '../errors.ts';
import { readJson } from './body.ts';
import { checkIfMatch } from './etag.ts';
import { hashJson, type IdempotentAnswer, idempotencyKey, runIdempotent } from './idempotency.ts';
import { limitApi } from './limits.ts';
import type { Reply } from './reply.ts';
import { refuse, toResponse } from './respond.ts';
import { validate } from './validate.ts';

type Row<Id extends EndpointId> = (typeof ENDPOINTS)[Id];
type Parsed<Id extends EndpointId, Part extends 'query' | 'body'> =
  Row<Id> extends Readonly<Record<Part, infer S extends z.ZodTypeAny>> ? z.output<S> : undefined;
type Answer<Id extends EndpointId> =
  Row<Id> extends { readonly response: infer S extends z.ZodTypeAny } ? z.input<S> : never;
type ParamOf<Path extends string> = Path extends `${string}{${infer Name}}${infer Rest}`
  ? Name | ParamOf<Rest>
  : never;
type OpenedBy<Id extends EndpointId> =
  Row<Id> extends { readonly opens: infer T extends Thing } ? Opened[T] : undefined;

export interface RouteInput<Id extends EndpointId> {
  readonly caller: Caller;
  readonly params: Readonly<Record<ParamOf<Row<Id>['path']>, string>>;
  readonly query: Parsed<Id, 'query'>;
  readonly body: Parsed<Id, 'body'>;
  /** What the endpoint's `opens` names, opened through the access door. */
  readonly opened: OpenedBy<Id>;
  readonly ifMatch: string | undefined;
  readonly request: Request;
  readonly address: string;
}

/** A route that knows its endpoint, for the test that walks src/pages. */
export type EndpointRoute = APIRoute & { readonly endpoint: EndpointId };

/**
 * Makes an Astro route of an endpoint: rate, caller, access, the thing it opens, If-Match, query, body, idempotency for POST;
 * then the handler; then JSON with the endpoint's status. Refusals have the catalogue's shape.
 */
export function route<Id extends EndpointId>(
  id: Id,
  handler: (input: RouteInput<Id>) => Promise<Reply<Answer<Id>>> | Reply<Answer<Id>>,
): EndpointRoute {
  const endpoint: Endpoint = ENDPOINTS[id];
  const run: APIRoute = async (context) => {
    const { request, locals, url } = context;
    const header = (name: string) => request.headers.get(name) ?? undefined;
    const address = context.clientAddress;
    try {
      const params = context.params as Record<string, string>;
      // Cookies and tokens are ignored where a link's secret decides.
      const caller = accessOf(id).share === 'no' ? locals.caller : await shareCaller(params.secret ?? '');
      await limitApi(caller, address);
      authorize(id, caller);
      checkParams(params);
      const opened = await open(id, endpoint, caller, params.id ?? '');
      const ifMatch = header('if-match');
      if (endpoint.ifMatch && opened !== undefined && 'edition' in opened)
        checkIfMatch(ifMatch, opened.edition);
      const query = endpoint.query && validate(endpoint.query, single(url.searchParams));
      const sent = endpoint.body && (await readJson(request));
      const body = endpoint.body && validate(endpoint.body, sent);
      // The generic parts follow from the endpoint's row; TypeScript cannot see that through the lookup.
      const input = { caller, params, query, body, opened, ifMatch, request, address } as RouteInput<Id>;
      const answer = async () => toAnswer(endpoint, await handler(input));
      const key = endpoint.method === 'POST' ? idempotencyKey(header('idempotency-key')) : undefined;
      if (key === undefined) return toResponse(await answer());
      const path = `${endpoint.method} ${url.pathname}`;
      return toResponse(await runIdempotent({ caller, path, key, contentHash: hashJson(sent) }, answer));
    } catch (thrown) {
      return refuse(thrown, { requestId: locals.requestId, endpoint: id });
    }
  };
  return Object.assign(run, { endpoint: id });
}

/** Ids and secrets are plain characters; what is not names nothing. */
function checkParams(params: Readonly<Record<string, string>>): void {
  if (!Object.values(params).every((value) => /^[\w-]{1,100}$/.test(value))) throw new ApiError('not_found');
}

async function open(
  id: EndpointId,
  endpoint: Endpoint,
  caller: Caller,
  thingId: string,
): Promise<Opened[Thing] | undefined> {
  if (endpoint.opens === undefined) return undefined;
  return OPENERS[endpoint.opens](caller, id, thingId, { deleted: endpoint.opensDeleted === true });
}

/** A query as an object; the same name twice is a mistake rather than a choice. */
function single(search: URLSearchParams): Record<string, string> {
  const query: Record<string, string> = {};
  for (const [name, value] of search) {
    if (Object.hasOwn(query, name)) {
      throw new ApiError('invalid', { details: [{ path: name, message: 'is given twice' }] });
    }
    // PostgreSQL takes no NUL in text, and no other control character is ever meant.
    if (/\p{Cc}/u.test(name + value)) {
      throw new ApiError('invalid', { details: [{ path: name, message: 'has control characters' }] });
    }
    query[name] = value;
  }
  return query;
}

function toAnswer(endpoint: Endpoint, reply: Reply<unknown>): IdempotentAnswer {
  const status = endpoint.successStatus ?? 200;
  const headers: Record<string, string> = { 'Cache-Control': 'no-store', ...reply.headers };
  if (reply.etag !== undefined) headers.ETag = reply.etag;
  if (status !== 204) headers['Content-Type'] = 'application/json; charset=utf-8';
  return {
    status,
    headers,
    body: status === 204 ? '' : JSON.stringify(reply.body),
    ...(reply.shownOnceFor === undefined ? {} : { shownOnceFor: reply.shownOnceFor }),
  };
}
