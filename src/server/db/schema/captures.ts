import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  doublePrecision,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  real,
  text,
  uniqueIndex,
} from 'drizzle-orm/pg-core';
import type { CAPTURE_STATUSES, CaptureJson } from '../../../contract/areas/captures.ts';
import type { RelationFindings, SignalFindings, Wheel } from '../../../engine/capture.ts';
import type { Circuit } from '../../../engine/circuit.ts';
import type { Recipe } from '../../../engine/derived/types.ts';
import type { PreviewLine, Reading, ReadingHints } from '../../../engine/reading/types.ts';
import { at, createdAt, edition } from './columns.ts';
import { job } from './jobs.ts';
import { person, workshop } from './workshop.ts';

/** A resumable upload; `id` is also the object's key in the store. */
export const upload = pgTable(
  'upload',
  {
    id: text('id').primaryKey(),
    workshopId: text('workshop_id')
      .notNull()
      .references(() => workshop.id),
    personId: text('person_id')
      .notNull()
      .references(() => person.id),
    length: bigint('length', { mode: 'number' }).notNull(),
    metadata: jsonb('metadata').$type<Record<string, string | null>>().notNull(),
    captureId: text('capture_id'),
    createdAt: createdAt(),
    finishedAt: at('finished_at'),
  },
  (t) => [index('upload_person').on(t.personId), index('upload_created').on(t.createdAt)],
);

export type CaptureStatus = (typeof CAPTURE_STATUSES)[number];

/** How the samples lie in time: the axis without an uneven axis's column, which is in the store. */
export type StoredAxis =
  | { kind: 'even'; startS: number; stepS: number; count: number }
  | { kind: 'uneven'; holds: boolean; count: number; startS: number; endS: number };

export interface SignalRequest {
  column: number;
  name?: string;
  circuit?: Circuit;
  unit?: string;
  factor?: number;
  offset?: number;
}

/** A derived signal: its recipe and its own number, below 0 where recorded ones have their file column. */
export type DerivedRequest = Recipe & { readonly column: number };

export const capture = pgTable(
  'capture',
  {
    id: text('id').primaryKey(),
    workshopId: text('workshop_id')
      .notNull()
      .references(() => workshop.id),
    createdBy: text('created_by')
      .notNull()
      .references(() => person.id),
    title: text('title').notNull(),
    note: text('note').notNull().default(''),
    jobId: text('job_id').references(() => job.id, { onDelete: 'set null' }),
    /** A learner's own: seen by its maker and by instructors and owners. */
    practice: boolean('practice').notNull().default(false),
    status: text('status').$type<CaptureStatus>().notNull().default('queued'),
    progress: real('progress').notNull().default(0),
    error: jsonb('error').$type<NonNullable<CaptureJson['error']>>(),
    /** Raised by every change that reads or measures again. */
    revision: integer('revision').notNull().default(1),
    edition: edition(),
    /** 0: no samples yet. */
    samplesVersion: integer('samples_version').notNull().default(0),
    axis: jsonb('axis').$type<StoredAxis>(),
    samples: bigint('samples', { mode: 'number' }).notNull().default(0),
    sha256: text('sha256').notNull(),
    bytes: bigint('bytes', { mode: 'number' }).notNull(),
    fileName: text('file_name').notNull(),
    originalKey: text('original_key').notNull(),
    cylinders: integer('cylinders'),
    /** What the person asked for by file column; wins over what the program proposes. */
    signalRequests: jsonb('signal_requests').$type<SignalRequest[]>().notNull().default([]),
    /** Signals that people asked to have made from the recorded ones; made again with every reading. */
    derived: jsonb('derived').$type<DerivedRequest[]>().notNull().default([]),
    hints: jsonb('hints').$type<ReadingHints>().notNull().default({}),
    reading: jsonb('reading').$type<Reading>(),
    preview: jsonb('preview').$type<PreviewLine[]>(),
    createdAt: createdAt(),
    updatedAt: at('updated_at').notNull().defaultNow(),
    deletedAt: at('deleted_at'),
  },
  (t) => [
    index('capture_workshop_created').on(t.workshopId, t.createdAt, t.id),
    index('capture_job').on(t.jobId),
    index('capture_title_trgm').using('gin', sql`${t.title} gin_trgm_ops`),
    index('capture_deleted').on(t.deletedAt).where(sql`${t.deletedAt} is not null`),
  ],
);

export const captureSignal = pgTable(
  'capture_signal',
  {
    captureId: text('capture_id')
      .notNull()
      .references(() => capture.id, { onDelete: 'cascade' }),
    index: integer('index').notNull(),
    column: integer('column').notNull(),
    name: text('name').notNull(),
    circuit: text('circuit').$type<Circuit>().notNull(),
    circuitConfidence: real('circuit_confidence').notNull(),
    circuitBecause: text('circuit_because').notNull().default(''),
    unit: text('unit').notNull(),
    factor: doublePrecision('factor').notNull().default(1),
    offset: doublePrecision('offset').notNull().default(0),
    /** How a derived signal was made, in words; null for a recorded one. */
    made: text('made'),
    rail: jsonb('rail').$type<{ low: number | null; high: number | null }>(),
  },
  (t) => [primaryKey({ columns: [t.captureId, t.index] }), index('capture_signal_circuit').on(t.circuit)],
);

/** The values of one capture; replaced as a whole when it is measured again. */
export const measurement = pgTable('measurement', {
  captureId: text('capture_id')
    .primaryKey()
    .references(() => capture.id, { onDelete: 'cascade' }),
  revision: integer('revision').notNull(),
  samplesVersion: integer('samples_version').notNull(),
  engine: text('engine').notNull(),
  signals: jsonb('signals').$type<SignalFindings[]>().notNull(),
  relations: jsonb('relations').$type<RelationFindings[]>().notNull(),
  wheel: jsonb('wheel').$type<Wheel>(),
  measuredAt: at('measured_at').notNull().defaultNow(),
});

export const mark = pgTable(
  'mark',
  {
    id: text('id').primaryKey(),
    captureId: text('capture_id')
      .notNull()
      .references(() => capture.id, { onDelete: 'cascade' }),
    /** Null when it came through a share link. */
    createdBy: text('created_by').references(() => person.id),
    author: text('author').notNull(),
    answerId: text('answer_id'),
    kind: text('kind').$type<'point' | 'range' | 'level'>().notNull(),
    signal: integer('signal'),
    fromS: doublePrecision('from_s').notNull(),
    toS: doublePrecision('to_s'),
    value: doublePrecision('value'),
    text: text('text').notNull(),
    edition: edition(),
    createdAt: createdAt(),
    updatedAt: at('updated_at').notNull().defaultNow(),
    deletedAt: at('deleted_at'),
  },
  (t) => [index('mark_capture').on(t.captureId, t.fromS)],
);

export const shareLink = pgTable(
  'share_link',
  {
    id: text('id').primaryKey(),
    captureId: text('capture_id')
      .notNull()
      .references(() => capture.id, { onDelete: 'cascade' }),
    createdBy: text('created_by')
      .notNull()
      .references(() => person.id),
    secretHash: text('secret_hash').notNull(),
    question: text('question').notNull().default(''),
    mayAnswer: boolean('may_answer').notNull().default(true),
    seen: integer('seen').notNull().default(0),
    createdAt: createdAt(),
    expiresAt: at('expires_at').notNull(),
    withdrawnAt: at('withdrawn_at'),
  },
  (t) => [uniqueIndex('share_link_secret').on(t.secretHash), index('share_link_capture').on(t.captureId)],
);

export const answer = pgTable(
  'answer',
  {
    id: text('id').primaryKey(),
    shareLinkId: text('share_link_id')
      .notNull()
      .references(() => shareLink.id, { onDelete: 'cascade' }),
    captureId: text('capture_id')
      .notNull()
      .references(() => capture.id, { onDelete: 'cascade' }),
    name: text('name').notNull(),
    text: text('text').notNull(),
    createdAt: createdAt(),
    hiddenAt: at('hidden_at'),
  },
  (t) => [
    index('answer_link').on(t.shareLinkId, t.createdAt),
    index('answer_capture').on(t.captureId, t.createdAt),
  ],
);
