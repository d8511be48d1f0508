import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  doublePrecision,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  real,
  text,
  timestamp,
  uniqueIndex,
} from 'drizzle-orm/pg-core';
import type { CAPTURE_STATUSES, CaptureJson } from '../../contract/areas/captures.ts';
import type { ComparisonJson, KnownGoodJson } from '../../contract/areas/library.ts';
import type { Role, Scope } from '../../contract/roles.ts';
import type { RelationFindings, SignalFindings, Wheel } from '../../engine/capture.ts';
import type { Circuit } from '../../engine/circuit.ts';
import type { PreviewLine, Reading, ReadingHints } from '../../engine/reading/types.ts';

const at = (name: string) => timestamp(name, { withTimezone: true, mode: 'date' });
const createdAt = () => at('created_at').notNull().defaultNow();
/** Raised by every change that people make: the ETag. */
const edition = () => integer('edition').notNull().default(1);

export const workshop = pgTable('workshop', {
  id: text('id').primaryKey(),
  name: text('name').notNull(),
  timeZone: text('time_zone').notNull().default('Etc/UTC'),
  demo: boolean('demo').notNull().default(false),
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
    jobId: text('job_id'),
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
    hints: jsonb('hints').$type<ReadingHints>().notNull().default({}),
    reading: jsonb('reading').$type<Reading>(),
    preview: jsonb('preview').$type<PreviewLine[]>(),
    createdAt: createdAt(),
    updatedAt: at('updated_at').notNull().defaultNow(),
    deletedAt: at('deleted_at'),
  },
  (t) => [
    index('capture_workshop_created').on(t.workshopId, t.createdAt, t.id),
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

export const knownGood = pgTable(
  'known_good',
  {
    id: text('id').primaryKey(),
    workshopId: text('workshop_id')
      .notNull()
      .references(() => workshop.id),
    createdBy: text('created_by')
      .notNull()
      .references(() => person.id),
    /** Where it came from; no foreign key, since it outlives its capture. */
    captureId: text('capture_id'),
    state: text('state').$type<KnownGoodJson['state']>().notNull().default('proposed'),
    make: text('make').notNull(),
    model: text('model').notNull(),
    code: text('code').notNull().default(''),
    year: integer('year'),
    cylinders: integer('cylinders'),
    condition: text('condition').$type<KnownGoodJson['condition']>().notNull(),
    note: text('note').notNull().default(''),
    provenance: text('provenance').notNull(),
    fromS: doublePrecision('from_s').notNull(),
    toS: doublePrecision('to_s').notNull(),
    /** The frozen axis, from fromS on. */
    axis: jsonb('axis').$type<StoredAxis>().notNull(),
    engineVersion: text('engine_version').notNull(),
    findings: jsonb('findings')
      .$type<{ signals: SignalFindings[]; relations: RelationFindings[]; wheel: Wheel | null }>()
      .notNull(),
    edition: edition(),
    createdAt: createdAt(),
    publishedAt: at('published_at'),
  },
  (t) => [
    index('known_good_workshop').on(t.workshopId, t.createdAt, t.id),
    index('known_good_engine').on(t.workshopId, t.make, t.model, t.condition),
  ],
);

export const knownGoodSignal = pgTable(
  'known_good_signal',
  {
    knownGoodId: text('known_good_id')
      .notNull()
      .references(() => knownGood.id, { onDelete: 'cascade' }),
    index: integer('index').notNull(),
    name: text('name').notNull(),
    circuit: text('circuit').$type<Circuit>().notNull(),
    unit: text('unit').notNull(),
    factor: doublePrecision('factor').notNull(),
    offset: doublePrecision('offset').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.knownGoodId, t.index] }),
    index('known_good_signal_circuit').on(t.circuit),
  ],
);

export const knownGoodReview = pgTable(
  'known_good_review',
  {
    id: text('id').primaryKey(),
    knownGoodId: text('known_good_id').notNull(),
    reviewerId: text('reviewer_id')
      .notNull()
      .references(() => person.id),
    decision: text('decision').$type<'publish' | 'return' | 'retire'>().notNull(),
    note: text('note').notNull().default(''),
    at: at('at').notNull().defaultNow(),
  },
  (t) => [
    index('known_good_review_of').on(t.knownGoodId, t.at),
    foreignKey({ columns: [t.knownGoodId], foreignColumns: [knownGood.id] }).onDelete('cascade'),
  ],
);

export const comparison = pgTable(
  'comparison',
  {
    id: text('id').primaryKey(),
    workshopId: text('workshop_id')
      .notNull()
      .references(() => workshop.id),
    createdBy: text('created_by')
      .notNull()
      .references(() => person.id),
    captureId: text('capture_id')
      .notNull()
      .references(() => capture.id, { onDelete: 'cascade' }),
    request: jsonb('request').$type<unknown>().notNull(),
    status: text('status').$type<ComparisonJson['status']>().notNull().default('queued'),
    error: text('error'),
    result: jsonb('result').$type<Partial<ComparisonJson>>(),
    createdAt: createdAt(),
  },
  (t) => [index('comparison_capture').on(t.captureId, t.createdAt)],
);
