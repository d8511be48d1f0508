import type { z } from 'zod';
import type { AccessName } from './roles.ts';

export type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE' | 'HEAD' | 'OPTIONS';

/** One row of the API. Paths are relative to /api/v1 with `{name}` for parameters. */
export interface Endpoint {
  readonly method: Method;
  readonly path: string;
  readonly summary: string;
  readonly access: AccessName;
  /** Checked on the query string (strings in; use z.coerce). */
  readonly query?: z.ZodTypeAny;
  /** Checked on the JSON body. */
  readonly body?: z.ZodTypeAny;
  /** `json` unless said: multipart and tus are streamed by the front handler. */
  readonly bodyKind?: 'json' | 'multipart' | 'tus';
  /** JSON answer, or a sentence when the answer is not JSON. */
  readonly response: z.ZodTypeAny | { readonly contentType: string; readonly description: string };
  readonly successStatus?: 200 | 201 | 204;
  /** Served by the front handler (src/entry), not by an Astro route. */
  readonly inFront?: true;
  /** PATCH, PUT and DELETE of what people edit take If-Match. */
  readonly ifMatch?: true;
  /** The thing that `{id}` names: the access door opens it before the handler runs, with the role held in its workshop. */
  readonly opens?: Thing;
  /** Hidden things open too (to bring them back). */
  readonly opensDeleted?: true;
}

/** What is opened by id through the access door. */
export const THINGS = [
  'capture',
  'mark',
  'shareLink',
  'answer',
  'knownGood',
  'comparison',
  'set',
  'exercise',
  'attempt',
  'invitation',
  'webhook',
  'job',
  'jobEntry',
  'photo',
] as const;
export type Thing = (typeof THINGS)[number];

/** Keeps the keys' and schemas' types while checking the shape. */
export const defineEndpoints = <const T extends Record<string, Endpoint>>(endpoints: T): T => endpoints;
