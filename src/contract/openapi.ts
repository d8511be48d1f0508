import {
  extendZodWithOpenApi,
  OpenAPIRegistry,
  OpenApiGeneratorV31,
  type RouteConfig,
} from '@asteasolutions/zod-to-openapi';
import { z } from 'zod';
import { errorBody } from './areas/common.ts';
import type { Endpoint } from './endpoint.ts';
import { ENDPOINTS } from './endpoints.ts';
import { ACCESS } from './roles.ts';

extendZodWithOpenApi(z);

let made: Record<string, unknown> | undefined;

/** The OpenAPI 3.1 description of every endpoint, made from the same rows that check requests and decide access. */
export function openApi(): Record<string, unknown> {
  made ??= describe();
  return made;
}

function describe(): Record<string, unknown> {
  const registry = new OpenAPIRegistry();
  registry.registerComponent('securitySchemes', 'token', {
    type: 'http',
    scheme: 'bearer',
    description: 'A personal token of one workshop.',
  });
  registry.registerComponent('securitySchemes', 'session', {
    type: 'apiKey',
    in: 'cookie',
    name: 'gapmark',
    description: 'The session cookie; `__Host-gapmark` with an https origin. Same-origin requests only.',
  });
  const error = registry.register('Error', errorBody);
  for (const [id, endpoint] of Object.entries<Endpoint>(ENDPOINTS)) {
    // OpenAPI's path items have no place for tus's creation options beyond its verbs; all of ours are among them.
    registry.registerPath(pathOf(id, endpoint, error));
  }
  const document = new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: '3.1.0',
    info: {
      title: 'Gapmark',
      version: '1',
      description:
        'Captures of engines that crank but do not start: upload, measure, compare, mark and share. Times are ISO 8601 in ' +
        'UTC, trace times are seconds of the capture’s own axis, ids are opaque.',
    },
    servers: [{ url: '/api/v1' }],
  });
  return { ...document };
}

function pathOf(id: string, endpoint: Endpoint, error: z.ZodTypeAny): RouteConfig {
  const access = ACCESS[endpoint.access];
  const { owner, instructor, technician, learner, scope, share, nobody } = access;
  const status = endpoint.successStatus ?? 200;
  return {
    operationId: id,
    method: endpoint.method.toLowerCase() as RouteConfig['method'],
    path: endpoint.path,
    summary: endpoint.summary,
    tags: [id.split('.')[0] ?? id],
    security:
      nobody || share !== 'no' ? [] : scope === 'none' ? [{ session: [] }] : [{ token: [] }, { session: [] }],
    request: requestOf(endpoint),
    responses: {
      [status]: successOf(endpoint, status),
      default: {
        description: 'A refusal, in words.',
        content: { 'application/json': { schema: error } },
      },
    },
    'x-access': { owner, instructor, technician, learner, scope, share, nobody },
  };
}

function successOf(endpoint: Endpoint, status: number) {
  const { response } = endpoint;
  if (status === 204) return { description: 'Done.' };
  if (!(response instanceof z.ZodType)) {
    const binary = { type: 'string' as const, format: 'binary' };
    return { description: response.description, content: { [response.contentType]: { schema: binary } } };
  }
  return { description: endpoint.summary, content: { 'application/json': { schema: response } } };
}

function requestOf(endpoint: Endpoint): NonNullable<RouteConfig['request']> {
  const names = [...endpoint.path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name ?? '');
  const headers: Record<string, z.ZodTypeAny> = {};
  if (endpoint.method === 'POST' && endpoint.bodyKind !== 'tus') {
    headers['Idempotency-Key'] = z.string().max(255).optional();
  }
  if (endpoint.ifMatch) headers['If-Match'] = z.string().optional();
  return {
    ...(names.length === 0
      ? {}
      : { params: z.object(Object.fromEntries(names.map((name) => [name, z.string()]))) }),
    ...(endpoint.query instanceof z.ZodObject ? { query: endpoint.query } : {}),
    ...(Object.keys(headers).length === 0 ? {} : { headers: z.object(headers) }),
    ...(endpoint.body === undefined ? {} : { body: bodyOf(endpoint, endpoint.body) }),
  };
}

function bodyOf(endpoint: Endpoint, schema: z.ZodTypeAny) {
  if (endpoint.bodyKind !== 'multipart') {
    return { required: true, content: { 'application/json': { schema } } };
  }
  const file = z.string().openapi({ format: 'binary' });
  const fields = schema instanceof z.ZodObject ? schema.extend({ file }) : schema;
  return { required: true, content: { 'multipart/form-data': { schema: fields } } };
}
