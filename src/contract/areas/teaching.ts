import { z } from 'zod';
import { CIRCUITS } from '../../engine/circuit.ts';
import { defineEndpoints } from '../endpoint.ts';
import { windowAnswer, windowQuery } from './captures.ts';
import { finite, id, isoTime, listOf, pageQuery, text } from './common.ts';
import { DIMENSIONS, UNITS, type Unit } from './teaching-units.ts';
import { circuit } from './values.ts';

const words = (max: number, message = 'must not be empty') => text(max).pipe(z.string().min(1, message));
const signalIndex = z.number().int().min(0).max(255);
export const unit = z.enum(UNITS);

/** Where the answer shows on the trace; `signal` counts the exercise's own signals. */
export const evidenceStretch = z
  .object({ signal: signalIndex.nullable(), from: finite, to: finite, label: text(120).default('') })
  .refine(({ from, to }) => to > from, { path: ['to'], message: 'ends after it begins' });

const choice = z.object({
  key: z.string().regex(/^[a-z0-9][a-z0-9-]{0,59}$/, 'small letters, digits and hyphens'),
  text: words(120),
  hint: text(160).default(''),
});

const asks = z
  .object({
    /** Choose a stretch: right when it holds half of a stretch of the evidence and is not much longer. */
    stretch: z
      .object({ atMostS: finite.positive().nullable().default(null) })
      .nullable()
      .default(null),
    circuit: z
      .object({
        signal: signalIndex,
        answer: circuit,
        choices: z.array(circuit).max(CIRCUITS.length).default([]),
      })
      .nullable()
      .default(null),
    cause: z
      .object({ choices: z.array(choice).min(2).max(12), answer: z.string().max(60) })
      .nullable()
      .default(null),
    value: z
      .object({ label: words(120), answer: finite, unit, tolerance: finite.nonnegative() })
      .nullable()
      .default(null),
    text: z
      .object({ prompt: words(300) })
      .nullable()
      .default(null),
  })
  .strict();

export const exerciseContent = z
  .object({
    question: words(600, 'say what the learner is to do'),
    /** What a customer or a fault memory said, shown beside the question. */
    facts: z
      .array(z.object({ label: words(40), value: words(200) }))
      .max(6)
      .default([]),
    captureId: id,
    /** Which of the capture's signals, in the order in which they are shown. */
    signals: z.array(signalIndex).min(1).max(8),
    /** The stretch that is shown; null: from its first or to its last sample. */
    from: finite.nullable().default(null),
    to: finite.nullable().default(null),
    /** Whether axes have numbers and units: needed where a value is to be read off. */
    scales: z.boolean().default(false),
    asks,
    answer: z.object({
      sentence: words(300, 'say the answer in one sentence'),
      evidence: z.array(evidenceStretch).max(200).default([]),
      reasoning: z
        .array(z.object({ title: words(80), text: words(600) }))
        .max(6)
        .default([]),
      /** How it was proved. */
      proof: text(600).default(''),
      /** What to take care of when doing it in the workshop. */
      caution: text(600).default(''),
    }),
  })
  .superRefine((content, context) => {
    const issue = (path: (string | number)[], message: string) =>
      context.addIssue({ code: 'custom', path, message });
    const { stretch, circuit, cause, value, text } = content.asks;
    if ([stretch, circuit, cause, value, text].every((ask) => ask === null))
      issue(['asks'], 'ask for at least one thing');
    if (new Set(content.signals).size !== content.signals.length) issue(['signals'], 'names a signal twice');
    if (content.from !== null && content.to !== null && content.to <= content.from)
      issue(['to'], 'ends after it begins');
    if (stretch !== null && content.answer.evidence.length === 0)
      issue(['answer', 'evidence'], 'a stretch is asked for: say where the answer lies');
    if (cause !== null && !cause.choices.some(({ key }) => key === cause.answer))
      issue(['asks', 'cause', 'answer'], 'is not among the choices');
    if (cause !== null && new Set(cause.choices.map(({ key }) => key)).size !== cause.choices.length)
      issue(['asks', 'cause', 'choices'], 'names a cause twice');
    if (circuit !== null && circuit.signal >= content.signals.length)
      issue(['asks', 'circuit', 'signal'], 'is not a signal of this exercise');
    if (circuit !== null && circuit.choices.length > 0 && !circuit.choices.includes(circuit.answer))
      issue(['asks', 'circuit', 'choices'], 'the answer is not among the choices');
    content.answer.evidence.forEach(({ signal }, at) => {
      if (signal !== null && signal >= content.signals.length)
        issue(['answer', 'evidence', at, 'signal'], 'is not a signal of this exercise');
    });
  });
export type ExerciseContent = z.output<typeof exerciseContent>;

export const EXERCISE_STATES = ['draft', 'open', 'retracted'] as const;
const exerciseState = z.enum(EXERCISE_STATES);

export const exerciseInput = z
  .object({
    title: words(120, 'a title that does not give the answer away'),
    state: exerciseState.default('draft'),
    content: exerciseContent,
  })
  .strict();
export const exercisePatch = z
  .object({ title: words(120), state: exerciseState, content: exerciseContent })
  .partial()
  .strict();

export const SURE = ['guess', 'rather', 'sure'] as const;

export const attemptInput = z
  .object({
    /** The version that was on the screen; another one by now is 409. */
    version: z.number().int().optional(),
    stretch: z
      .object({ from: finite, to: finite })
      .refine(({ from, to }) => to > from, { path: ['to'], message: 'ends after it begins' })
      .optional(),
    circuit: circuit.optional(),
    cause: z.string().max(60).optional(),
    /** As typed: a decimal comma or point, with or without the unit. */
    value: z.object({ text: words(40), unit: unit.optional() }).optional(),
    text: words(4_000).optional(),
    sure: z.enum(SURE).nullable().default(null),
    why: text(1_000).default(''),
  })
  .strict();

export const MARKS = ['right', 'partly', 'wrong', 'waiting'] as const;
const partMark = z.object({ mark: z.enum(MARKS), why: z.string() });
export const OUTCOMES = ['right', 'partly', 'wrong', 'waiting'] as const;
export const outcome = z.enum(OUTCOMES);

export const attempt = z.object({
  id,
  version: z.number().int(),
  answers: z.object({
    stretch: z.object({ from: z.number(), to: z.number() }).optional(),
    circuit: circuit.optional(),
    cause: z.string().optional(),
    value: z.object({ text: z.string(), number: z.number(), unit }).optional(),
    text: z.string().optional(),
  }),
  sure: z.enum(SURE).nullable(),
  why: z.string(),
  marks: z.object({
    stretch: partMark.optional(),
    circuit: partMark.optional(),
    cause: partMark.optional(),
    value: partMark.optional(),
    text: partMark.optional(),
  }),
  outcome,
  comment: z.string(),
  judgedBy: z.string().nullable(),
  judgedAt: isoTime.nullable(),
  createdAt: isoTime,
  etag: z.string(),
});
export type AttemptJson = z.infer<typeof attempt>;

export const attemptOf = attempt.extend({ person: z.object({ id, name: z.string() }) });
export type AttemptOfJson = z.infer<typeof attemptOf>;

const traceSignal = z.object({
  /** The exercise's own count from 0. */
  index: z.number().int(),
  name: z.string(),
  circuit,
  unit: z.string(),
  factor: z.number(),
  offset: z.number(),
});

export const exerciseTrace = z.object({
  samplesVersion: z.number().int(),
  startS: z.number(),
  durationS: z.number(),
  samples: z.number().int(),
  axis: z.enum(['even', 'uneven', 'holds']).nullable(),
  /** Neutral until the caller has committed. */
  signals: z.array(traceSignal),
});
export type ExerciseTrace = z.infer<typeof exerciseTrace>;

export const exerciseAnswer = z.object({
  sentence: z.string(),
  evidence: z.array(
    z.object({ signal: z.number().int().nullable(), from: z.number(), to: z.number(), label: z.string() }),
  ),
  reasoning: z.array(z.object({ title: z.string(), text: z.string() })),
  proof: z.string(),
  caution: z.string(),
  circuit: z.object({ signal: z.number().int(), circuit }).nullable(),
  cause: z.object({ key: z.string(), text: z.string() }).nullable(),
  value: z.object({ answer: z.number(), unit, tolerance: z.number() }).nullable(),
  /** The trace's signals under their own names. */
  signals: z.array(traceSignal),
  /** The capture that it rests on, where the caller may open it. */
  captureId: id.nullable(),
});
export type ExerciseAnswer = z.infer<typeof exerciseAnswer>;

export const exercise = z.object({
  id,
  title: z.string(),
  state: exerciseState,
  version: z.number().int(),
  setBy: z.string(),
  question: z.string(),
  facts: z.array(z.object({ label: z.string(), value: z.string() })),
  scales: z.boolean(),
  asks: z.object({
    stretch: z.boolean(),
    circuit: z.object({ signal: z.number().int(), choices: z.array(circuit) }).nullable(),
    cause: z
      .object({ choices: z.array(z.object({ key: z.string(), text: z.string(), hint: z.string() })) })
      .nullable(),
    value: z.object({ label: z.string(), units: z.array(unit) }).nullable(),
    text: z.object({ prompt: z.string() }).nullable(),
  }),
  /** Null when the capture is no longer there. */
  trace: exerciseTrace.nullable(),
  /** The caller's own. */
  attempt: attempt.nullable(),
  /** Opens when the caller has committed; instructors and owners have it always. */
  answer: exerciseAnswer.nullable(),
  /** The sets that it stands in and that the caller sees, with the exercise before and after it. */
  sets: z.array(
    z.object({
      id,
      title: z.string(),
      place: z.number().int(),
      of: z.number().int(),
      next: id.nullable(),
      done: z.array(z.boolean()),
    }),
  ),
  /** For instructors and owners only. */
  staff: z
    .object({
      content: exerciseContent.innerType(),
      attempts: z.number().int(),
      captureTitle: z.string().nullable(),
      captureChanged: z.boolean(),
      openLinks: z.number().int(),
    })
    .nullable(),
});
export type ExerciseJson = z.infer<typeof exercise>;

export const exerciseRow = z.object({
  id,
  title: z.string(),
  state: exerciseState,
  version: z.number().int(),
  createdAt: isoTime,
  /** The caller's own. */
  outcome: outcome.nullable(),
  /** For instructors and owners only. */
  staff: z
    .object({
      captureId: id.nullable(),
      captureTitle: z.string().nullable(),
      answer: z.string(),
      attempts: z.number().int(),
      waiting: z.number().int(),
    })
    .nullable(),
});
export type ExerciseRowJson = z.infer<typeof exerciseRow>;

export const SET_STATES = ['draft', 'open'] as const;
export const AUDIENCES = ['nobody', 'everyone', 'named'] as const;

export const setInput = z
  .object({
    title: words(120, 'give the set a title'),
    intro: text(2_000).default(''),
    state: z.enum(SET_STATES).default('draft'),
    audience: z.enum(AUDIENCES).default('nobody'),
    /** Whom it is set for, with the audience `named`. */
    people: z.array(id).max(1_000).default([]),
  })
  .strict();
export const setPatch = z
  .object({
    title: words(120),
    intro: text(2_000),
    state: z.enum(SET_STATES),
    audience: z.enum(AUDIENCES),
    people: z.array(id).max(1_000),
  })
  .partial()
  .strict();

export const setRow = z.object({
  id,
  title: z.string(),
  intro: z.string(),
  state: z.enum(SET_STATES),
  audience: z.enum(AUDIENCES),
  setBy: z.string(),
  exercises: z.number().int(),
  /** Exercises of it that the caller has answered. */
  answered: z.number().int(),
  /** For instructors and owners: answers given and answers possible. */
  tried: z
    .object({ given: z.number().int(), possible: z.number().int(), learners: z.number().int() })
    .nullable(),
  createdAt: isoTime,
  etag: z.string(),
});
export type SetRowJson = z.infer<typeof setRow>;

export const setItem = z.object({
  id,
  kind: z.enum(['text', 'capture', 'exercise']),
  text: z.string(),
  afterCommit: z.boolean(),
  capture: z.object({ id, title: z.string(), circuits: z.array(circuit) }).nullable(),
  exercise: z
    .object({
      id,
      title: z.string(),
      state: exerciseState,
      outcome: outcome.nullable(),
      asks: z.array(z.string()),
    })
    .nullable(),
  /** There is something here that opens when an exercise has been answered. */
  withheld: z.boolean(),
});
export type SetItemJson = z.infer<typeof setItem>;

export const set = setRow.extend({
  /** For instructors and owners; empty for others. */
  people: z.array(z.object({ id, name: z.string() })),
  items: z.array(setItem),
});
export type SetJson = z.infer<typeof set>;

export const setItemInput = z.discriminatedUnion('kind', [
  z
    .object({
      id: id.optional(),
      kind: z.literal('text'),
      text: words(8_000),
      afterCommit: z.boolean().default(false),
    })
    .strict(),
  z
    .object({ id: id.optional(), kind: z.literal('capture'), captureId: id, text: text(2_000).default('') })
    .strict(),
  z.object({ id: id.optional(), kind: z.literal('exercise'), exerciseId: id }).strict(),
]);
export type SetItemInput = z.output<typeof setItemInput>;

export const results = z.object({
  exercises: z.array(
    z.object({
      id,
      title: z.string(),
      right: z.number().int(),
      tried: z.number().int(),
      waiting: z.number().int(),
    }),
  ),
  people: z.array(
    z.object({
      id,
      name: z.string(),
      attempts: z.array(z.object({ exerciseId: id, attemptId: id, outcome })),
    }),
  ),
  /** What it was (rows) and what was chosen (columns), over all answers with a cause. */
  confusion: z.object({
    causes: z.array(z.object({ key: z.string(), text: z.string() })),
    counts: z.array(z.array(z.number().int())),
    n: z.number().int(),
  }),
});
export type ResultsJson = z.infer<typeof results>;

/** Units that a learner may answer in when the answer has this one. */
export const unitsLike = (of: Unit): Unit[] =>
  Object.values(DIMENSIONS)
    .map((units) => Object.keys(units) as Unit[])
    .find((units) => units.includes(of)) ?? [of];

const CSV = { contentType: 'text/csv', description: 'One row a learner and exercise.' };

export const teachingEndpoints = defineEndpoints({
  'sets.list': {
    method: 'GET',
    path: '/sets',
    summary: 'Sets: for instructors and owners all of the current workshop, for others those set for them.',
    access: 'self',
    query: pageQuery,
    response: listOf(setRow),
  },
  'sets.create': {
    method: 'POST',
    path: '/sets',
    summary: 'Make a set.',
    access: 'teach',
    body: setInput,
    response: set,
    successStatus: 201,
  },
  'sets.get': {
    method: 'GET',
    path: '/sets/{id}',
    summary: 'A set with its items, as the caller sees them.',
    access: 'self',
    opens: 'set',
    response: set,
  },
  'sets.patch': {
    method: 'PATCH',
    path: '/sets/{id}',
    summary: 'Change a set, and whom it is set for.',
    access: 'teach',
    opens: 'set',
    body: setPatch,
    response: set,
    ifMatch: true,
  },
  'sets.delete': {
    method: 'DELETE',
    path: '/sets/{id}',
    summary: 'Take a set away; it can be brought back for 30 days.',
    access: 'teach',
    opens: 'set',
    response: z.null(),
    successStatus: 204,
    ifMatch: true,
  },
  'sets.restore': {
    method: 'POST',
    path: '/sets/{id}/restore',
    summary: 'Bring a set back.',
    access: 'teach',
    opens: 'set',
    opensDeleted: true,
    response: set,
  },
  'sets.items': {
    method: 'GET',
    path: '/sets/{id}/items',
    summary: 'The items of a set, in order.',
    access: 'self',
    opens: 'set',
    response: listOf(setItem),
  },
  'sets.addItem': {
    method: 'POST',
    path: '/sets/{id}/items',
    summary: 'Add an item at the end.',
    access: 'teach',
    opens: 'set',
    body: setItemInput,
    response: set,
    successStatus: 201,
  },
  'sets.putItems': {
    method: 'PUT',
    path: '/sets/{id}/items',
    summary: 'The whole list anew: order, additions and removals in one go.',
    access: 'teach',
    opens: 'set',
    body: z.object({ items: z.array(setItemInput).max(200) }).strict(),
    response: set,
    ifMatch: true,
  },
  'sets.results': {
    method: 'GET',
    path: '/sets/{id}/results',
    summary: 'Answers by learner and exercise, and which cause was taken for which.',
    access: 'seeTeach',
    opens: 'set',
    response: results,
  },
  'sets.exportResults': {
    method: 'GET',
    path: '/sets/{id}/results/export',
    summary: 'The same as CSV.',
    access: 'seeTeach',
    opens: 'set',
    response: CSV,
    inFront: true,
  },
  'exercises.list': {
    method: 'GET',
    path: '/exercises',
    summary:
      'Exercises: for instructors and owners all of the current workshop, for others those set for them.',
    access: 'self',
    query: pageQuery,
    response: listOf(exerciseRow),
  },
  'exercises.create': {
    method: 'POST',
    path: '/exercises',
    summary: 'Make an exercise on a capture.',
    access: 'teach',
    body: exerciseInput,
    response: exercise,
    successStatus: 201,
  },
  'exercises.get': {
    method: 'GET',
    path: '/exercises/{id}',
    summary: 'An exercise. Names, numbers and the answer open to its learner once they have committed.',
    access: 'self',
    opens: 'exercise',
    response: exercise,
  },
  'exercises.patch': {
    method: 'PATCH',
    path: '/exercises/{id}',
    summary: 'Change, open or retract an exercise. Attempts keep the version that they answered.',
    access: 'teach',
    opens: 'exercise',
    body: exercisePatch,
    response: exercise,
    ifMatch: true,
  },
  'exercises.delete': {
    method: 'DELETE',
    path: '/exercises/{id}',
    summary: 'Take an exercise away; it can be brought back for 30 days.',
    access: 'teach',
    opens: 'exercise',
    response: z.null(),
    successStatus: 204,
    ifMatch: true,
  },
  'exercises.restore': {
    method: 'POST',
    path: '/exercises/{id}/restore',
    summary: 'Bring an exercise back.',
    access: 'teach',
    opens: 'exercise',
    opensDeleted: true,
    response: exercise,
  },
  'exercises.window': {
    method: 'GET',
    path: '/exercises/{id}/window',
    summary:
      'Samples of an exercise under its own signal numbers; the only way to them for a learner who has not committed.',
    access: 'self',
    opens: 'exercise',
    query: windowQuery,
    response: windowAnswer,
    inFront: true,
  },
  'attempts.create': {
    method: 'POST',
    path: '/exercises/{id}/attempts',
    summary: 'Commit to an answer, once. The answer opens with it.',
    access: 'attempt',
    opens: 'exercise',
    body: attemptInput,
    response: exercise,
    successStatus: 201,
  },
  'attempts.list': {
    method: 'GET',
    path: '/exercises/{id}/attempts',
    summary: 'What was answered, by whom.',
    access: 'seeTeach',
    opens: 'exercise',
    query: pageQuery,
    response: listOf(attemptOf),
  },
  'attempts.judge': {
    method: 'PATCH',
    path: '/attempts/{id}',
    summary: 'Judge the free text of an answer.',
    access: 'teach',
    opens: 'attempt',
    body: z.object({ mark: z.enum(['right', 'partly', 'wrong']), comment: text(2_000).default('') }).strict(),
    response: attemptOf,
    ifMatch: true,
  },
});
