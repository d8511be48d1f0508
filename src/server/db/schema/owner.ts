import { index, integer, jsonb, pgTable, text } from 'drizzle-orm/pg-core';
import { at, createdAt, edition } from './columns.ts';
import { person, workshop } from './workshop.ts';

/** An address that is told of events. Its signing key is sealed (see ../../seal.ts). */
export const webhook = pgTable(
  'webhook',
  {
    id: text('id').primaryKey(),
    workshopId: text('workshop_id')
      .notNull()
      .references(() => workshop.id),
    createdBy: text('created_by')
      .notNull()
      .references(() => person.id),
    url: text('url').notNull(),
    sealedKey: text('sealed_key').notNull(),
    edition: edition(),
    createdAt: createdAt(),
    deletedAt: at('deleted_at'),
  },
  (t) => [index('webhook_workshop').on(t.workshopId)],
);

/** One event on its way to one address, and what became of it. */
export const webhookDelivery = pgTable(
  'webhook_delivery',
  {
    id: text('id').primaryKey(),
    webhookId: text('webhook_id')
      .notNull()
      .references(() => webhook.id, { onDelete: 'cascade' }),
    event: text('event').notNull(),
    payload: jsonb('payload').$type<unknown>().notNull(),
    state: text('state').$type<'waiting' | 'delivered' | 'given up'>().notNull().default('waiting'),
    tries: integer('tries').notNull().default(0),
    /** The last answer's status, or null when none came. */
    status: integer('status'),
    error: text('error'),
    createdAt: createdAt(),
    triedAt: at('tried_at'),
  },
  (t) => [index('webhook_delivery_of').on(t.webhookId, t.createdAt)],
);
