/** Where a request about sign-in comes from. */
export interface Browser {
  readonly address: string;
  /** The Cookie header: the session that it names ends when another begins. */
  readonly cookieHeader: string | undefined;
  /** The program's own name of itself. */
  readonly agent: string;
}

export const browserOfRequest = (request: Request, address: string): Browser => ({
  address,
  cookieHeader: request.headers.get('cookie') ?? undefined,
  agent: (request.headers.get('user-agent') ?? '').replace(/\p{Cc}/gu, ' ').slice(0, 300),
});
