import type { IncomingMessage, ServerResponse } from 'node:http';
import type { Caller } from '../server/access.ts';

/** One request as the front handler's endpoints see it. */
export interface FrontRequest {
  readonly request: IncomingMessage;
  readonly response: ServerResponse;
  readonly url: URL;
  /** What the endpoint's path names: `id` or `secret`. */
  readonly params: Readonly<Record<string, string>>;
  readonly header: (name: string) => string | undefined;
  readonly address: string;
  readonly requestId: string;
}

export interface CalledRequest extends FrontRequest {
  readonly caller: Caller;
}
