import { type SQL, sql } from 'drizzle-orm';
import {
  customType,
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
import type { Portrait } from '../../../engine/comparison/shapes/portrait.ts';
import { capture, type StoredAxis } from './captures.ts';
import { at, createdAt, edition } from './columns.ts';
import { person, workshop } from './workshop.ts';

/** Bytes as they are. */
const bytes = customType<{ data: Uint8Array; driverData: Buffer }>({ dataType: () => 'bytea' });

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
    /** First and last model year. */
    year: integer('year'),
    yearTo: integer('year_to'),
    cylinders: integer('cylinders'),
    condition: text('condition').$type<KnownGoodJson['condition']>().notNull(),
    note: text('note').notNull().default(''),
    provenance: text('provenance').notNull(),
    instrument: text('instrument').notNull().default(''),
    probe: text('probe').notNull().default(''),
    /** How it was confirmed that what was recorded was good. */
    confirmed: text('confirmed').notNull().default(''),
    /** Of the crank signal among the frozen ones, as found; null without one. */
    wheelPattern: text('wheel_pattern'),
    /** The one that this is a newer version of. */
    supersedes: text('supersedes'),
    /** The newer version, once that is published. */
    supersededBy: text('superseded_by'),
    version: integer('version').notNull().default(1),
    /** What words are looked for in. */
    words: text('words')
      .notNull()
      .generatedAlwaysAs(
        (): SQL =>
          sql`lower(${knownGood.make} || ' ' || ${knownGood.model} || ' ' || ${knownGood.code} || ' ' || ${knownGood.condition} || ' ' || ${knownGood.note} || ' ' || ${knownGood.instrument} || ' ' || coalesce(${knownGood.wheelPattern}, ''))`,
      ),
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
    index('known_good_words').using('gin', sql`${t.words} gin_trgm_ops`),
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
    /** A small picture, and the shape as 128 float32 (little-endian); null where there is none. */
    portrait: jsonb('portrait').$type<Portrait>(),
    shape: bytes('shape'),
    /** Version that picture and shape were made with; 0: not made yet. */
    shapeVersion: integer('shape_version').notNull().default(0),
  },
  (t) => [
    primaryKey({ columns: [t.knownGoodId, t.index] }),
    index('known_good_signal_circuit').on(t.circuit),
    index('known_good_signal_shape').on(t.shapeVersion),
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

/** Raised whenever a workshop's published shapes change, so that what is kept of them in memory is known to be old. */
export const shapeEdition = pgTable('shape_edition', {
  workshopId: text('workshop_id')
    .primaryKey()
    .references(() => workshop.id, { onDelete: 'cascade' }),
  edition: integer('edition').notNull().default(1),
});

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
    /** Set by hand, kept through a new run: the shift and the sprocket's teeth. */
    adjustment: jsonb('adjustment').$type<ComparisonJson['adjustment']>(),
    edition: edition(),
    createdAt: createdAt(),
  },
  (t) => [
    index('comparison_capture').on(t.captureId, t.createdAt),
    index('comparison_workshop').on(t.workshopId, t.createdAt, t.id),
  ],
);
