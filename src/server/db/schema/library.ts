import {
  doublePrecision,
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
} from 'drizzle-orm/pg-core';
import type { ComparisonJson, KnownGoodJson } from '../../../contract/areas/library.ts';
import type { RelationFindings, SignalFindings, Wheel } from '../../../engine/capture.ts';
import type { Circuit } from '../../../engine/circuit.ts';
import { capture, type StoredAxis } from './captures.ts';
import { at, createdAt, edition } from './columns.ts';
import { person, workshop } from './workshop.ts';

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
