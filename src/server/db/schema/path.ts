import { index, jsonb, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import type { CheckRecordJson } from '../../../contract/areas/path.ts';
import { at, createdAt, edition } from './columns.ts';
import { job } from './jobs.ts';
import { person } from './workshop.ts';

/** What was recorded for one check of a job; the last word, with who said it. */
export const jobCheck = pgTable(
  'job_check',
  {
    jobId: text('job_id')
      .notNull()
      .references(() => job.id, { onDelete: 'cascade' }),
    check: text('check').notNull(),
    result: text('result').$type<CheckRecordJson['result']>().notNull(),
    finding: text('finding'),
    readings: jsonb('readings').$type<CheckRecordJson['readings']>().notNull().default([]),
    codes: jsonb('codes').$type<string[]>().notNull().default([]),
    captureIds: jsonb('capture_ids').$type<string[]>().notNull().default([]),
    note: text('note').notNull().default(''),
    /** Why it stands although something speaks against it. */
    stands: text('stands').notNull().default(''),
    personId: text('person_id')
      .notNull()
      .references(() => person.id),
    author: text('author').notNull(),
    edition: edition(),
    createdAt: createdAt(),
    updatedAt: at('updated_at').notNull().defaultNow(),
  },
  (t) => [primaryKey({ columns: [t.jobId, t.check] })],
);

/** A person's word over the reasoning. */
export const jobOverrule = pgTable(
  'job_overrule',
  {
    jobId: text('job_id')
      .notNull()
      .references(() => job.id, { onDelete: 'cascade' }),
    cause: text('cause').notNull(),
    decision: text('decision').$type<'put back' | 'set aside'>().notNull(),
    why: text('why').notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => person.id),
    author: text('author').notNull(),
    createdAt: createdAt(),
  },
  (t) => [primaryKey({ columns: [t.jobId, t.cause] }), index('job_overrule_job').on(t.jobId)],
);
