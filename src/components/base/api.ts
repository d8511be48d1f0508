/** A refusal of the API, as a person reads it. */
export class ApiFailure extends Error {
  readonly status: number;
  readonly code: string;
  readonly hint: string | undefined;
  readonly details: readonly { readonly path: string; readonly message: string }[];
  readonly retryAfterS: number | null;

  constructor(
    status: number,
    code: string,
    message: string,
    hint?: string,
    details: ApiFailure['details'] = [],
    retryAfterS: number | null = null,
  ) {
    super(message);
    this.name = 'ApiFailure';
    this.status = status;
    this.code = code;
    this.hint = hint;
    this.details = details;
    this.retryAfterS = retryAfterS;
  }

  /** Message, hint and what is wrong with which field, as sentences. */
  get sentence(): string {
    const fields = this.details.map(({ path, message }) => (path === '' ? message : `${path}: ${message}`));
    return [this.message, this.hint, ...fields].filter((part) => part !== undefined && part !== '').join(' ');
  }
}

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null;
const textOr = (value: unknown, other: string) => (typeof value === 'string' ? value : other);

function detailsOf(value: unknown): ApiFailure['details'] {
  if (!Array.isArray(value)) return [];
  return value
    .filter(isRecord)
    .map((detail) => ({ path: textOr(detail.path, ''), message: textOr(detail.message, '') }));
}

/** Reads the API's error shape; an answer without it (a proxy, a dropped line) still gives a sentence. */
export async function failureOf(response: Response): Promise<ApiFailure> {
  const retryAfter = Number(response.headers.get('retry-after'));
  const retryAfterS = Number.isFinite(retryAfter) && retryAfter > 0 ? retryAfter : null;
  const body: unknown = await response.json().catch(() => null);
  const error = isRecord(body) && isRecord(body.error) ? body.error : {};
  const hint = typeof error.hint === 'string' ? error.hint : undefined;
  return new ApiFailure(
    response.status,
    textOr(error.code, 'unknown'),
    textOr(error.message, `The server answered with ${response.status} and no reason.`),
    hint,
    detailsOf(error.details),
    retryAfterS,
  );
}

/** The line was away: nothing reached the server, or its answer did not reach us. */
const noAnswer = () =>
  new ApiFailure(0, 'no_connection', 'The server did not answer.', 'Check the connection, then try again.');

export interface ApiAnswer<T> {
  readonly data: T;
  /** Hand it back with a change: the server refuses it when somebody else changed the thing since. */
  readonly etag: string | null;
}

interface ApiOptions {
  readonly method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  readonly body?: unknown;
  readonly etag?: string | null;
  /** Idempotency-Key of a POST: sending it again after a lost answer does it no second time. */
  readonly key?: string;
  readonly signal?: AbortSignal;
}

/** Calls our own API at the same origin. `T` is a type of src/contract: the server checks what it sends. */
export async function api<T>(path: string, options: ApiOptions = {}): Promise<ApiAnswer<T>> {
  const headers = new Headers({ accept: 'application/json' });
  if (options.body !== undefined) headers.set('content-type', 'application/json');
  if (options.etag) headers.set('if-match', options.etag);
  if (options.key !== undefined) headers.set('idempotency-key', options.key);
  const response = await fetch(`/api/v1${path}`, {
    method: options.method ?? 'GET',
    headers,
    credentials: 'same-origin',
    ...(options.body === undefined ? {} : { body: JSON.stringify(options.body) }),
    ...(options.signal === undefined ? {} : { signal: options.signal }),
  }).catch((cause: unknown) => {
    throw options.signal?.aborted ? cause : noAnswer();
  });
  if (!response.ok) throw await failureOf(response);
  const data = (response.status === 204 ? null : await response.json()) as T;
  return { data, etag: response.headers.get('etag') };
}

/** For SWR: the key is the path. */
export const fetcher = async <T>(path: string): Promise<T> => (await api<T>(path)).data;

/** The same with the ETag, for things that the page changes. */
export const fetcherWithEtag = <T>(path: string): Promise<ApiAnswer<T>> => api<T>(path);

/** Any thrown thing as one sentence for a person. */
export const sentenceOf = (thrown: unknown): string =>
  thrown instanceof ApiFailure
    ? thrown.sentence
    : 'Something went wrong on this page. Reload it and try again.';
