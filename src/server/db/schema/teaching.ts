import { sql } from 'drizzle-orm';
import { boolean, index, integer, jsonb, pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core';
import type {
  AttemptJson,
  ExerciseContent,
  ExerciseJson,
  SetJson,
} from '../../../contract/areas/teaching.ts';
import { capture } from './captures.ts';
import { at, createdAt, edition } from './columns.ts';
import { person, workshop } from './workshop.ts';

/** An instructor's ordered set. */
export const teachingSet = pgTable(
  'teaching_set',
  {
    id: text('id').primaryKey(),
    workshopId: text('workshop_id')
      .notNull()
      .references(() => workshop.id),
    createdBy: text('created_by')
      .notNull()
      .references(() => person.id),
    title: text('title').notNull(),
    intro: text('intro').notNull().default(''),
    state: text('state').$type<SetJson['state']>().notNull().default('draft'),
    /** Whom it is set for: nobody yet, every learner of the workshop, or those in `teaching_set_person`. */
    audience: text('audience').$type<SetJson['audience']>().notNull().default('nobody'),
    edition: edition(),
    createdAt: createdAt(),
    updatedAt: at('updated_at').notNull().defaultNow(),
    deletedAt: at('deleted_at'),
  },
  (t) => [index('teaching_set_workshop').on(t.workshopId, t.createdAt, t.id)],
);

export const teachingSetPerson = pgTable(
  'teaching_set_person',
  {
    setId: text('set_id')
      .notNull()
      .references(() => teachingSet.id, { onDelete: 'cascade' }),
    personId: text('person_id')
      .notNull()
      .references(() => person.id),
  },
  (t) => [primaryKey({ columns: [t.setId, t.personId] }), index('teaching_set_person_of').on(t.personId)],
);

/** A question on a trace. What it asks and its answer are in its versions; those never change. */
export const exercise = pgTable(
  'exercise',
  {
    id: text('id').primaryKey(),
    workshopId: text('workshop_id')
      .notNull()
      .references(() => workshop.id),
    createdBy: text('created_by')
      .notNull()
      .references(() => person.id),
    /** Null once its capture is gone for good; the attempts stay. */
    captureId: text('capture_id').references(() => capture.id, { onDelete: 'set null' }),
    /** The same file uploaded twice is the same trace. */
    captureSha256: text('capture_sha256').notNull(),
    title: text('title').notNull(),
    state: text('state').$type<ExerciseJson['state']>().notNull().default('draft'),
    version: integer('version').notNull().default(1),
    edition: edition(),
    createdAt: createdAt(),
    updatedAt: at('updated_at').notNull().defaultNow(),
    deletedAt: at('deleted_at'),
  },
  (t) => [
    index('exercise_workshop').on(t.workshopId, t.createdAt, t.id),
    index('exercise_capture').on(t.captureId),
    index('exercise_sha256').on(t.workshopId, t.captureSha256).where(sql`${t.state} = 'open'`),
  ],
);

export const exerciseVersion = pgTable(
  'exercise_version',
  {
    exerciseId: text('exercise_id')
      .notNull()
      .references(() => exercise.id, { onDelete: 'cascade' }),
    version: integer('version').notNull(),
    content: jsonb('content').$type<ExerciseContent>().notNull(),
    /** The samples that it was written on. */
    samplesVersion: integer('samples_version').notNull(),
    createdAt: createdAt(),
  },
  (t) => [primaryKey({ columns: [t.exerciseId, t.version] })],
);

export const teachingSetItem = pgTable(
  'teaching_set_item',
  {
    id: text('id').primaryKey(),
    setId: text('set_id')
      .notNull()
      .references(() => teachingSet.id, { onDelete: 'cascade' }),
    position: integer('position').notNull(),
    kind: text('kind').$type<'text' | 'capture' | 'exercise'>().notNull(),
    /** The text, or the caption of a capture. */
    text: text('text').notNull().default(''),
    /** Shown to a learner only once every exercise before it is answered. */
    afterCommit: boolean('after_commit').notNull().default(false),
    captureId: text('capture_id').references(() => capture.id, { onDelete: 'cascade' }),
    exerciseId: text('exercise_id').references(() => exercise.id, { onDelete: 'cascade' }),
  },
  (t) => [
    index('teaching_set_item_set').on(t.setId, t.position),
    index('teaching_set_item_capture').on(t.captureId),
    index('teaching_set_item_exercise').on(t.exerciseId),
  ],
);

/** What a person committed to: once for each exercise, held by the index. */
export const attempt = pgTable(
  'attempt',
  {
    id: text('id').primaryKey(),
    exerciseId: text('exercise_id')
      .notNull()
      .references(() => exercise.id, { onDelete: 'cascade' }),
    personId: text('person_id')
      .notNull()
      .references(() => person.id),
    version: integer('version').notNull(),
    answers: jsonb('answers').$type<AttemptJson['answers']>().notNull(),
    sure: text('sure').$type<AttemptJson['sure']>(),
    why: text('why').notNull().default(''),
    marks: jsonb('marks').$type<AttemptJson['marks']>().notNull(),
    outcome: text('outcome').$type<AttemptJson['outcome']>().notNull(),
    judgedBy: text('judged_by').references(() => person.id),
    judgedAt: at('judged_at'),
    comment: text('comment').notNull().default(''),
    edition: edition(),
    createdAt: createdAt(),
  },
  (t) => [
    uniqueIndex('attempt_once').on(t.exerciseId, t.personId),
    index('attempt_person').on(t.personId, t.createdAt),
  ],
);
