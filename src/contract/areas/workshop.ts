import { z } from 'zod';
import { defineEndpoints } from '../endpoint.ts';
import { ROLES, SCOPES } from '../roles.ts';
import { email, id, isoTime, listOf, pageQuery, text } from './common.ts';

const role = z.enum(ROLES);
export const password = z.string().min(10, 'at least 10 characters').max(200);
/** An IANA time zone name that this server knows. */
export const timeZone = z
  .string()
  .max(64)
  .refine((name) => {
    try {
      new Intl.DateTimeFormat('en', { timeZone: name });
      return true;
    } catch {
      return false;
    }
  }, 'is not a known time zone');

/** Days that lines of the audit list are kept: a month to ten years. */
export const auditDays = z.number().int().min(30).max(3660);

export const signUpInput = z.object({
  name: text(80).pipe(z.string().min(1)),
  email,
  password,
  workshop: text(80).pipe(z.string().min(1)),
});
/** The secret of a mailed link. */
export const confirmInput = z.object({ secret: z.string().min(20).max(200) });

/** `mail_sent`: a mail tells how to go on, whether the address was known or not. `signed_in`: mail does not work here. */
export const signUpAnswer = z.object({ status: z.enum(['mail_sent', 'signed_in']) });

export const signInInput = z.object({ email, password: z.string().min(1).max(200) });

export const me = z.object({
  id,
  name: z.string(),
  email: z.string(),
  role,
  workshop: z.object({ id, name: z.string(), timeZone: z.string() }),
  workshops: z.array(z.object({ id, name: z.string(), role })),
  via: z.enum(['session', 'token']),
  /** Kinds of mail that this person has switched off. */
  mutedMail: z.array(z.string()),
});
export type MeJson = z.infer<typeof me>;

export const token = z.object({
  id,
  name: z.string(),
  scopes: z.array(z.enum(SCOPES)),
  createdAt: isoTime,
  expiresAt: isoTime,
  lastUsedAt: isoTime.nullable(),
});
export const person = z.object({ id, name: z.string(), email: z.string(), role, since: isoTime });

export const workshopEndpoints = defineEndpoints({
  health: {
    method: 'GET',
    path: '/health',
    summary: 'Whether the server can reach its database and store.',
    access: 'open',
    response: z.object({
      status: z.enum(['ok', 'degraded']),
      database: z.boolean(),
      store: z.boolean(),
      version: z.string(),
    }),
  },
  openapi: {
    method: 'GET',
    path: '/openapi.json',
    summary: 'This description.',
    access: 'open',
    response: z.record(z.unknown()),
  },
  'session.signUp': {
    method: 'POST',
    path: '/sign-up',
    summary:
      'Ask for an account and a workshop. A mail with a link confirms the address; the answer is the same for a known one.',
    access: 'open',
    body: signUpInput,
    response: signUpAnswer,
    successStatus: 201,
  },
  'session.confirmSignUp': {
    method: 'POST',
    path: '/sign-up/confirm',
    summary: 'Make the account and the workshop with the secret of the mailed link; signs in.',
    access: 'open',
    body: confirmInput,
    response: me,
    successStatus: 201,
  },
  'session.signIn': {
    method: 'POST',
    path: '/sign-in',
    summary:
      'Sign in; sets the session cookie. Where a code is needed too, the answer says so: see /sign-in/code.',
    access: 'open',
    body: signInInput,
    response: z.union([me, z.object({ status: z.literal('code_needed') })]),
  },
  'session.signOut': {
    method: 'POST',
    path: '/sign-out',
    summary: 'End this session.',
    access: 'selfSession',
    response: z.null(),
    successStatus: 204,
  },
  'me.get': { method: 'GET', path: '/me', summary: 'Who is calling.', access: 'self', response: me },
  'me.workshop': {
    method: 'PUT',
    path: '/me/workshop',
    summary: 'Switch the current workshop.',
    access: 'selfSession',
    body: z.object({ workshopId: id }),
    response: me,
  },
  'workshop.get': {
    method: 'GET',
    path: '/workshop',
    summary: 'The current workshop.',
    access: 'seeStaff',
    response: z.object({
      id,
      name: z.string(),
      timeZone: z.string(),
      storageBytes: z.number(),
      captures: z.number().int(),
      limitBytes: z.number().nullable(),
      auditDays: z.number().int(),
      endsAt: isoTime.nullable(),
    }),
  },
  'workshop.patch': {
    method: 'PATCH',
    path: '/workshop',
    summary: 'Change name, time zone, or how many days the audit list is kept.',
    access: 'manage',
    body: z
      .object({ name: text(80).pipe(z.string().min(1)), timeZone, auditDays })
      .partial()
      .strict(),
    response: z.object({ id, name: z.string(), timeZone: z.string(), auditDays: z.number().int() }),
    ifMatch: true,
  },
  'people.list': {
    method: 'GET',
    path: '/people',
    summary: 'People of the current workshop.',
    access: 'seeManage',
    query: pageQuery,
    response: listOf(person),
  },
  'people.patch': {
    method: 'PATCH',
    path: '/people/{id}',
    summary: 'Change a role. The last owner stays owner.',
    access: 'manage',
    body: z.object({ role }).strict(),
    response: person,
  },
  'tokens.list': {
    method: 'GET',
    path: '/tokens',
    summary: 'Own tokens, without their secrets.',
    access: 'selfSession',
    response: listOf(token),
  },
  'tokens.create': {
    method: 'POST',
    path: '/tokens',
    summary: 'Make a personal token. Its secret is shown once.',
    access: 'selfSession',
    body: z.object({
      name: text(80).pipe(z.string().min(1)),
      scopes: z.array(z.enum(SCOPES)).min(1),
      expiresAt: isoTime.optional(),
    }),
    response: z.object({ id, token: z.string(), expiresAt: isoTime }),
    successStatus: 201,
  },
  'tokens.delete': {
    method: 'DELETE',
    path: '/tokens/{id}',
    summary: 'End a token.',
    access: 'selfSession',
    response: z.null(),
    successStatus: 204,
  },
  'audit.list': {
    method: 'GET',
    path: '/audit',
    summary: 'What happened that matters: who, what, when, from where.',
    access: 'seeManage',
    query: pageQuery,
    response: listOf(
      z.object({
        id,
        at: isoTime,
        who: z.string(),
        action: z.string(),
        subject: z.string(),
        address: z.string(),
      }),
    ),
  },
});
