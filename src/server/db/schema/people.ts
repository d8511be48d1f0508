import { bigint, index, integer, pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core';
import type { Role } from '../../../contract/roles.ts';
import { at, createdAt } from './columns.ts';
import { person, workshop } from './workshop.ts';

/**
 * A mail on its way. What it says is sealed (see ../../seal.ts), since it may hold a link's secret, and is forgotten once it
 * has been sent.
 */
export const outgoingMail = pgTable(
  'outgoing_mail',
  {
    id: text('id').primaryKey(),
    kind: text('kind').notNull(),
    sealed: text('sealed'),
    createdAt: createdAt(),
    /** Of no use any more after this. */
    notAfter: at('not_after').notNull(),
    sentAt: at('sent_at'),
    /** The mail server refused it for good, or its time was over. */
    givenUpAt: at('given_up_at'),
  },
  (t) => [index('outgoing_mail_created').on(t.createdAt)],
);

/** A link sent by mail to set a new password or to confirm a new address. `id` is the SHA-256 of its secret; used once, it goes. */
export const mailedLink = pgTable(
  'mailed_link',
  {
    id: text('id').primaryKey(),
    kind: text('kind').$type<'password' | 'email'>().notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => person.id, { onDelete: 'cascade' }),
    /** The new address. */
    email: text('email'),
    createdAt: createdAt(),
    expiresAt: at('expires_at').notNull(),
  },
  (t) => [index('mailed_link_person').on(t.personId), index('mailed_link_expires').on(t.expiresAt)],
);

export const invitation = pgTable(
  'invitation',
  {
    id: text('id').primaryKey(),
    workshopId: text('workshop_id')
      .notNull()
      .references(() => workshop.id),
    email: text('email').notNull(),
    role: text('role').$type<Role>().notNull(),
    secretHash: text('secret_hash').notNull(),
    invitedBy: text('invited_by')
      .notNull()
      .references(() => person.id),
    createdAt: createdAt(),
    expiresAt: at('expires_at').notNull(),
    acceptedAt: at('accepted_at'),
    withdrawnAt: at('withdrawn_at'),
  },
  (t) => [
    uniqueIndex('invitation_secret').on(t.secretHash),
    index('invitation_workshop').on(t.workshopId, t.createdAt),
  ],
);

/** The second step of a person's sign-in: the TOTP key, sealed. In use from `confirmedAt` on. */
export const secondStep = pgTable('second_step', {
  personId: text('person_id')
    .primaryKey()
    .references(() => person.id, { onDelete: 'cascade' }),
  sealed: text('sealed').notNull(),
  confirmedAt: at('confirmed_at'),
  /** The time step of the last code taken: no code works twice. */
  lastStep: bigint('last_step', { mode: 'number' }).notNull().default(0),
  createdAt: createdAt(),
});

/** Codes that stand in for the second step, once each. Only their SHA-256 is kept. */
export const recoveryCode = pgTable(
  'recovery_code',
  {
    personId: text('person_id')
      .notNull()
      .references(() => person.id, { onDelete: 'cascade' }),
    hash: text('hash').notNull(),
  },
  (t) => [primaryKey({ columns: [t.personId, t.hash] })],
);

/** The password was right and the code is awaited. `id` is the SHA-256 of the secret in the browser's cookie. */
export const pendingSignIn = pgTable(
  'pending_sign_in',
  {
    id: text('id').primaryKey(),
    personId: text('person_id')
      .notNull()
      .references(() => person.id, { onDelete: 'cascade' }),
    tries: integer('tries').notNull().default(0),
    expiresAt: at('expires_at').notNull(),
  },
  (t) => [index('pending_sign_in_expires').on(t.expiresAt)],
);
