import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  uniqueIndex,
} from 'drizzle-orm/pg-core';
import type { MailSwitch } from '../../../contract/areas/people.ts';
import type { Role, Scope } from '../../../contract/roles.ts';
import { at, createdAt, edition } from './columns.ts';

export const workshop = pgTable('workshop', {
  id: text('id').primaryKey(),
  name: text('name').notNull(),
  timeZone: text('time_zone').notNull().default('Etc/UTC'),
  demo: boolean('demo').notNull().default(false),
  /** How long lines of the audit list are kept. */
  auditDays: integer('audit_days').notNull().default(730),
  /** An owner has asked to delete the workshop: everything in it goes then. */
  endsAt: at('ends_at'),
  edition: edition(),
  createdAt: createdAt(),
});

export const person = pgTable(
  'person',
  {
    id: text('id').primaryKey(),
    /** Lower case. */
    email: text('email').notNull(),
    name: text('name').notNull(),
    passwordHash: text('password_hash').notNull(),
    currentWorkshopId: text('current_workshop_id').references(() => workshop.id),
    /** Kinds of mail that the person has switched off. */
    mutedMail: text('muted_mail').array().$type<MailSwitch[]>().notNull().default(sql`'{}'::text[]`),
    createdAt: createdAt(),
  },
  (t) => [uniqueIndex('person_email').on(t.email)],
);

export const membership = pgTable(
  'membership',
  {
    personId: text('person_id')
      .notNull()
      .references(() => person.id),
    workshopId: text('workshop_id')
      .notNull()
      .references(() => workshop.id),
    role: text('role').$type<Role>().notNull(),
    createdAt: createdAt(),
  },
  (t) => [primaryKey({ columns: [t.personId, t.workshopId] }), index('membership_workshop').on(t.workshopId)],
);

/** `id` is the SHA-256 of the cookie's secret. */
export const session = pgTable(
  'session',
  {
    id: text('id').primaryKey(),
    userId: text('user_id')
      .notNull()
      .references(() => person.id),
    expiresAt: at('expires_at').notNull(),
    createdAt: createdAt(),
    /** Where it began, and with which program, so that its person recognises it. */
    address: text('address').notNull().default(''),
    agent: text('agent').notNull().default(''),
  },
  (t) => [index('session_person').on(t.userId)],
);

export const token = pgTable(
  'token',
  {
    id: text('id').primaryKey(),
    personId: text('person_id')
      .notNull()
      .references(() => person.id),
    workshopId: text('workshop_id')
      .notNull()
      .references(() => workshop.id),
    name: text('name').notNull(),
    hash: text('hash').notNull(),
    scopes: text('scopes').array().$type<Scope[]>().notNull(),
    createdAt: createdAt(),
    expiresAt: at('expires_at').notNull(),
    lastUsedAt: at('last_used_at'),
  },
  (t) => [uniqueIndex('token_hash').on(t.hash), index('token_person').on(t.personId)],
);

/** A sign-up that waits for its address to be confirmed by mail. `id` is the SHA-256 of the mailed link's secret. */
export const pendingSignUp = pgTable(
  'pending_sign_up',
  {
    id: text('id').primaryKey(),
    email: text('email').notNull(),
    name: text('name').notNull(),
    workshop: text('workshop').notNull(),
    passwordHash: text('password_hash').notNull(),
    createdAt: createdAt(),
    expiresAt: at('expires_at').notNull(),
  },
  (t) => [index('pending_sign_up_expires').on(t.expiresAt)],
);

/** Table of the rate limiter (rate-limiter-flexible's own columns). */
export const rateLimit = pgTable('rate_limit', {
  key: text('key').primaryKey(),
  points: integer('points').notNull().default(0),
  expire: bigint('expire', { mode: 'number' }),
});

export const idempotency = pgTable(
  'idempotency',
  {
    /** Caller, path and key, hashed. */
    id: text('id').primaryKey(),
    contentHash: text('content_hash').notNull(),
    state: text('state').$type<'running' | 'done'>().notNull(),
    status: integer('status'),
    body: jsonb('body').$type<unknown>(),
    createdAt: createdAt(),
  },
  (t) => [index('idempotency_created').on(t.createdAt)],
);

export const audit = pgTable(
  'audit',
  {
    id: text('id').primaryKey(),
    workshopId: text('workshop_id').references(() => workshop.id),
    personId: text('person_id').references(() => person.id),
    who: text('who').notNull(),
    action: text('action').notNull(),
    subject: text('subject').notNull(),
    address: text('address').notNull().default(''),
    at: at('at').notNull().defaultNow(),
  },
  (t) => [index('audit_workshop_at').on(t.workshopId, t.at)],
);
