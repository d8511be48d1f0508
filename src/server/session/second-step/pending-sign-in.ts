import { and, eq, gt, lt, sql } from 'drizzle-orm';
import { Cookie } from 'lucia';
import { db } from '../../db/client.ts';
import { pendingSignIn } from '../../db/schema.ts';
import { hashSecret, newSecret } from '../../ids.ts';
import { cookieName, secureCookies } from '../cookie-name.ts';

const WAIT_S = 10 * 60;
/** Then the password is asked for again. */
const TRIES = 6;

const stepCookieName = () => `${cookieName()}-step`;

const cookie = (value: string, maxAge: number) =>
  new Cookie(stepCookieName(), value, {
    httpOnly: true,
    sameSite: 'lax',
    secure: secureCookies(),
    path: '/',
    maxAge,
  });

/** Remembers for ten minutes that this browser gave the right password. */
export async function beginPendingSignIn(personId: string): Promise<Cookie> {
  const secret = newSecret();
  const expiresAt = new Date(Date.now() + WAIT_S * 1000);
  await db()
    .insert(pendingSignIn)
    .values({ id: hashSecret(secret), personId, expiresAt });
  return cookie(secret, WAIT_S);
}

export const endedPendingCookie = (): Cookie => cookie('', 0);

function idOf(cookieHeader: string | undefined): string | null {
  for (const part of (cookieHeader ?? '').split(';')) {
    const [name, value = ''] = part.trim().split('=');
    if (name === stepCookieName() && /^[\w-]{43}$/.test(value)) return hashSecret(value);
  }
  return null;
}

/** Counts a try at the code; gives whose sign-in waits, or null when none does or it was tried too often. */
export async function tryPendingSignIn(
  cookieHeader: string | undefined,
): Promise<{ id: string; personId: string } | null> {
  const id = idOf(cookieHeader);
  if (id === null) return null;
  const [row] = await db()
    .update(pendingSignIn)
    .set({ tries: sql`${pendingSignIn.tries} + 1` })
    .where(
      and(eq(pendingSignIn.id, id), gt(pendingSignIn.expiresAt, sql`now()`), lt(pendingSignIn.tries, TRIES)),
    )
    .returning({ id: pendingSignIn.id, personId: pendingSignIn.personId });
  return row ?? null;
}

/** Whether a browser is between the two steps. */
export async function isPending(cookieHeader: string | undefined): Promise<boolean> {
  const id = idOf(cookieHeader);
  if (id === null) return false;
  const [row] = await db()
    .select({ id: pendingSignIn.id })
    .from(pendingSignIn)
    .where(and(eq(pendingSignIn.id, id), gt(pendingSignIn.expiresAt, sql`now()`)));
  return row !== undefined;
}
