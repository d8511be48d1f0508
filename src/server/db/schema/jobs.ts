import { type SQL, sql } from 'drizzle-orm';
import { doublePrecision, index, integer, jsonb, pgTable, text, uniqueIndex } from 'drizzle-orm/pg-core';
import type { JobJson, PhotoJson } from '../../../contract/areas/jobs.ts';
import { at, createdAt, edition } from './columns.ts';
import { person, workshop } from './workshop.ts';

/** A vehicle's visit. */
export const job = pgTable(
  'job',
  {
    id: text('id').primaryKey(),
    workshopId: text('workshop_id')
      .notNull()
      .references(() => workshop.id),
    /** Counts up within the workshop. */
    number: integer('number').notNull(),
    createdBy: text('created_by')
      .notNull()
      .references(() => person.id),
    assigneeId: text('assignee_id').references(() => person.id),
    make: text('make').notNull().default(''),
    model: text('model').notNull().default(''),
    year: integer('year'),
    engine: text('engine').notNull().default(''),
    vin: text('vin').notNull().default(''),
    plate: text('plate').notNull().default(''),
    cylinders: integer('cylinders'),
    complaint: text('complaint').notNull(),
    codes: jsonb('codes').$type<string[]>().notNull().default([]),
    state: text('state').$type<JobJson['state']>().notNull().default('open'),
    outcome: jsonb('outcome').$type<NonNullable<JobJson['outcome']>>(),
    closedAt: at('closed_at'),
    closedBy: text('closed_by').references(() => person.id),
    edition: edition(),
    createdAt: createdAt(),
    updatedAt: at('updated_at').notNull().defaultNow(),
    deletedAt: at('deleted_at'),
    /** Everything that a job is found by; a plate and a VIN also without the spaces and dashes that people type or do not. */
    search: text('search').generatedAlwaysAs(
      (): SQL => sql`'J-' || lpad(number::text, greatest(4, length(number::text)), '0') || ' ' || make || ' ' || model || ' ' || coalesce(year::text, '') || ' ' ||
        engine || ' ' || vin || ' ' || plate || ' ' || regexp_replace(plate, '[^[:alnum:]]', '', 'g') || ' ' || complaint || ' ' ||
        codes::text || ' ' || coalesce(outcome ->> 'cause', '') || ' ' || coalesce(outcome ->> 'part', '')`,
    ),
  },
  (t) => [
    uniqueIndex('job_workshop_number').on(t.workshopId, t.number),
    index('job_workshop_created').on(t.workshopId, t.createdAt, t.id),
    index('job_search_trgm').using('gin', sql`${t.search} gin_trgm_ops`),
    index('job_deleted').on(t.deletedAt).where(sql`${t.deletedAt} is not null`),
  ],
);

/** Notes, readings from gauges and meters, and what the product noted by itself. */
export const jobEntry = pgTable(
  'job_entry',
  {
    id: text('id').primaryKey(),
    jobId: text('job_id')
      .notNull()
      .references(() => job.id, { onDelete: 'cascade' }),
    createdBy: text('created_by')
      .notNull()
      .references(() => person.id),
    /** The name at the time, which stays readable when the person is gone. */
    author: text('author').notNull(),
    kind: text('kind').$type<'note' | 'reading' | 'event'>().notNull(),
    text: text('text').notNull().default(''),
    what: text('what'),
    value: doublePrecision('value'),
    unit: text('unit'),
    edition: edition(),
    createdAt: createdAt(),
    updatedAt: at('updated_at').notNull().defaultNow(),
    deletedAt: at('deleted_at'),
  },
  (t) => [index('job_entry_job').on(t.jobId, t.createdAt)],
);

/** A photo as it was written anew: the bytes that a person sent are not kept. */
export const jobPhoto = pgTable(
  'job_photo',
  {
    id: text('id').primaryKey(),
    jobId: text('job_id')
      .notNull()
      .references(() => job.id, { onDelete: 'cascade' }),
    createdBy: text('created_by')
      .notNull()
      .references(() => person.id),
    author: text('author').notNull(),
    caption: text('caption').notNull().default(''),
    /** Key of the check that it belongs to. */
    check: text('check'),
    contentType: text('content_type').$type<PhotoJson['contentType']>().notNull(),
    width: integer('width').notNull(),
    height: integer('height').notNull(),
    bytes: integer('bytes').notNull(),
    sha256: text('sha256').notNull(),
    edition: edition(),
    createdAt: createdAt(),
    deletedAt: at('deleted_at'),
  },
  (t) => [
    index('job_photo_job').on(t.jobId, t.createdAt),
    index('job_photo_deleted').on(t.deletedAt).where(sql`${t.deletedAt} is not null`),
  ],
);
