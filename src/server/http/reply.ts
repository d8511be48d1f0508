/** What a route's handler answers; the endpoint's row gives the status. */
export interface Reply<T> {
  readonly body: T;
  readonly etag?: string;
  readonly headers?: Readonly<Record<string, string>>;
  /** The body shows a secret once: a repeat with the same Idempotency-Key is told this id instead. */
  readonly shownOnceFor?: string;
}

export const reply = <T>(body: T, extra: Omit<Reply<T>, 'body'> = {}): Reply<T> => ({ body, ...extra });

/** The answer of an endpoint that gives 204. */
export const nothing: Reply<null> = { body: null };
