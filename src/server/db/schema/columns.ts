import { integer, timestamp } from 'drizzle-orm/pg-core';

/** A moment, with its zone, as a Date. */
export const at = (name: string) => timestamp(name, { withTimezone: true, mode: 'date' });

export const createdAt = () => at('created_at').notNull().defaultNow();

/** Raised by every change that people make: the ETag. */
export const edition = () => integer('edition').notNull().default(1);
