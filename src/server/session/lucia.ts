import { DrizzlePostgreSQLAdapter } from '@lucia-auth/adapter-drizzle';
import { type Cookie, Lucia, TimeSpan } from 'lucia';
import { db } from '../db/client.ts';
import { person, session } from '../db/schema.ts';
import { hashSecret, newSecret } from '../ids.ts';
import { cookieName, secureCookies } from './cookie-name.ts';

interface PersonAttributes {
  name: string;
  email: string;
  currentWorkshopId: string | null;
}

declare module 'lucia' {
  interface Register {
    Lucia: ReturnType<typeof makeLucia>;
    DatabaseUserAttributes: PersonAttributes;
  }
}

const makeLucia = () =>
  new Lucia(new DrizzlePostgreSQLAdapter(db(), session, person), {
    // Half-way through, a session that is used begins anew; one that is not used for 30 days has ended.
    sessionExpiresIn: new TimeSpan(30, 'd'),
    sessionCookie: {
      name: cookieName(),
      // The cookie outlives the session: the database says whether it still counts.
      expires: false,
      attributes: { secure: secureCookies(), sameSite: 'lax', path: '/' },
    },
    getUserAttributes: ({ name, email, currentWorkshopId }) => ({ name, email, currentWorkshopId }),
  });

let made: ReturnType<typeof makeLucia> | undefined;

/** Sessions in PostgreSQL. Lucia is handed the SHA-256 of the cookie's secret as the session's id, never the secret. */
export function lucia(): ReturnType<typeof makeLucia> {
  made ??= makeLucia();
  return made;
}

/** Starts a session; gives its cookie. The session that this browser had ends. */
export async function startSession(personId: string, earlierCookie: string | undefined): Promise<Cookie> {
  await endSession(earlierCookie);
  const secret = newSecret();
  await lucia().createSession(personId, {}, { sessionId: hashSecret(secret) });
  return lucia().createSessionCookie(secret);
}

/** Ends the session of a Cookie header, if there is one; gives the cookie that clears it. */
export async function endSession(cookieHeader: string | undefined): Promise<Cookie> {
  const secret = cookieHeader === undefined ? null : lucia().readSessionCookie(cookieHeader);
  if (secret !== null && secret !== '') await lucia().invalidateSession(hashSecret(secret));
  return lucia().createBlankSessionCookie();
}
