import { type Caller, NOBODY } from '../access.ts';
import { ApiError } from '../errors.ts';
import { lucia } from '../session/lucia.ts';
import { callerOfSession, callerOfToken } from '../session/person-caller.ts';

interface CallerRequest {
  readonly header: (name: string) => string | undefined;
  readonly address: string;
}

/**
 * Who is asking: a bearer token when there is one (the cookie is then not looked at), else the session cookie, else nobody.
 * Share links are not callers here: their secret is in the path (see captures/sharing/share-caller.ts).
 */
export async function resolveCaller({ header }: CallerRequest): Promise<Caller> {
  const authorization = header('authorization');
  if (authorization !== undefined) {
    const secret = /^Bearer ([\w.~+/-]{1,200})$/i.exec(authorization)?.[1];
    const caller = secret === undefined ? null : await callerOfToken(secret);
    if (caller === null) {
      throw new ApiError('not_signed_in', { message: 'This token is not known here, or it has ended.' });
    }
    return caller;
  }
  const secret = lucia().readSessionCookie(header('cookie') ?? '');
  if (secret === null || !/^[\w-]{43}$/.test(secret)) return NOBODY;
  return (await callerOfSession(secret)) ?? NOBODY;
}
