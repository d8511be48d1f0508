import { DrizzlePostgreSQLAdapter } from '@lucia-auth/adapter-drizzle';
import { type Cookie, Lucia, TimeSpan } from 'lucia';
import { db } from '../db/client.ts';
import { person, session } from '../db/schema.ts';
import { hashSecret, newSecret } from '../ids.ts';
import type { Browser } from './browser.ts';
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
    DatabaseSessionAttributes: { address: string; agent: string };
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
export async function startSession(personId: string, browser: Browser): Promise<Cookie> {
  await endSession(browser.cookieHeader);
  const secret = newSecret();
  const { address, agent } = browser;
  await lucia().createSession(personId, { address, agent }, { sessionId: hashSecret(secret) });
  return lucia().createSessionCookie(secret);
}

/** Ends the session of a Cookie header, if there is one; gives the cookie that clears it. */
export async function endSession(cookieHeader: string | undefined): Promise<Cookie> {
  const secret = cookieHeader === undefined ? null : lucia().readSessionCookie(cookieHeader);
  if (secret !== null && secret !== '') await lucia().invalidateSession(hashSecret(secret));
  return lucia().createBlankSessionCookie();
}

/** Ends every session of a person; where one of them asked for it, that browser gets a new one. */
export async function renewSession(personId: string, browser: Browser): Promise<Cookie> {
  await lucia().invalidateUserSessions(personId);
  return startSession(personId, browser);
}

/** The person whom a Cookie header names, whether or not they belong to a workshop now. */
export async function personOfCookie(
  cookieHeader: string | undefined,
): Promise<{ id: string; email: string; name: string } | null> {
  const secret = lucia().readSessionCookie(cookieHeader ?? '');
  if (secret === null || !/^[\w-]{43}$/.test(secret)) return null;
  const { user } = await lucia().validateSession(hashSecret(secret));
  return user;
}
