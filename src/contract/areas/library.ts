import { z } from 'zod';
import { defineEndpoints } from '../endpoint.ts';
import { wheel, windowAnswer, windowQuery } from './captures.ts';
import { finite, id, isoTime, listOf, pageQuery, text } from './common.ts';
import { circuit, notice, value } from './values.ts';

export const CONDITIONS = ['cranking', 'idle', 'part load', 'full load', 'key on', 'bench', 'other'] as const;
export const condition = z.enum(CONDITIONS);
export const KNOWN_GOOD_STATES = ['proposed', 'published', 'returned', 'retired', 'superseded'] as const;

export const engineInput = z.object({
  make: text(80).pipe(z.string().min(1)),
  model: text(80).pipe(z.string().min(1)),
  code: text(40).default(''),
  /** First model year, and the last one where it is a range. */
  year: z.number().int().min(1900).max(2100).nullable().default(null),
  yearTo: z.number().int().min(1900).max(2100).nullable().default(null),
  cylinders: z.number().int().min(1).max(16).nullable().default(null),
});

export const knownGoodInput = z.object({
  captureId: id,
  signals: z.array(z.number().int().min(0).max(255)).min(1).max(64),
  from: finite.optional(),
  to: finite.optional(),
  engine: engineInput,
  condition,
  note: text(2_000).default(''),
  /** Who recorded it, on what instrument and probe, how it was confirmed. */
  provenance: text(2_000).pipe(z.string().min(1, 'say who recorded it, on what, and how it was confirmed')),
  instrument: text(200).default(''),
  probe: text(200).default(''),
  confirmed: text(1_000).default(''),
  /** A known-good that this is a newer version of: published, it takes the older one's place. */
  supersedes: id.nullable().default(null),
});

/** A small picture of a signal: points 0 (lowest) to 255 (highest) at equal steps of its axis, null where there is nothing. */
export const portrait = z.object({
  axis: z.enum(['deg', 'width', 's']),
  from: z.number(),
  to: z.number(),
  low: z.number(),
  high: z.number(),
  points: z.array(z.number().int().min(0).max(255).nullable()),
});

export const knownGood = z.object({
  id,
  state: z.enum(KNOWN_GOOD_STATES),
  engine: engineInput,
  condition,
  note: z.string(),
  provenance: z.string(),
  instrument: z.string(),
  probe: z.string(),
  confirmed: z.string(),
  wheelPattern: z.string().nullable(),
  version: z.number().int(),
  supersedes: id.nullable(),
  supersededBy: id.nullable(),
  captureId: id.nullable(),
  fromS: z.number(),
  toS: z.number(),
  engineVersion: z.string().nullable(),
  /** Samples of each signal, and how they lie in time. */
  samples: z.number().int(),
  axis: z.enum(['even', 'uneven', 'holds']),
  signals: z.array(
    z.object({
      index: z.number().int(),
      name: z.string(),
      circuit,
      unit: z.string(),
      factor: z.number(),
      offset: z.number(),
      portrait: portrait.nullable(),
      values: z.array(value),
      notices: z.array(notice),
    }),
  ),
  relations: z.array(
    z.object({ signals: z.array(z.number().int()), values: z.array(value), notices: z.array(notice) }),
  ),
  wheel,
  reviews: z.array(
    z.object({
      decision: z.enum(['publish', 'return', 'retire']),
      note: z.string(),
      by: z.string(),
      at: isoTime,
    }),
  ),
  /** Every version of it, oldest first, this one included. */
  versions: z.array(
    z.object({ id, version: z.number().int(), state: z.enum(KNOWN_GOOD_STATES), createdAt: isoTime }),
  ),
  createdBy: z.object({ id, name: z.string() }),
  createdAt: isoTime,
  publishedAt: isoTime.nullable(),
});
export type KnownGoodJson = z.infer<typeof knownGood>;

export const knownGoodRow = knownGood
  .omit({ wheel: true, relations: true, reviews: true, versions: true, samples: true, axis: true })
  .extend({
    signals: z.array(
      z.object({
        index: z.number().int(),
        name: z.string(),
        circuit,
        unit: z.string(),
        portrait: portrait.nullable(),
        /** The few values that a sheet shows. */
        values: z.array(z.object({ key: z.string(), value: z.number(), unit: z.string() })),
      }),
    ),
  });
export type KnownGoodRowJson = z.infer<typeof knownGoodRow>;

/** What a person set by hand: how far the reference is moved against the signal, and the teeth of the crank's belt sprocket. */
export const adjustment = z.object({
  shift: z.number().finite().min(-720).max(720).nullable().default(null),
  axis: z.enum(['deg', 's']).nullable().default(null),
  sprocketTeeth: z.number().int().min(8).max(80).nullable().default(null),
});
const sprocketTeeth = z.number().int().min(8).max(80).optional();

export const comparisonInput = z.union([
  z
    .object({
      signal: z.number().int().min(0),
      knownGoodId: id,
      otherSignal: z.number().int().min(0).optional(),
      sprocketTeeth,
    })
    .strict(),
  z
    .object({
      signal: z.number().int().min(0),
      captureId: id,
      otherSignal: z.number().int().min(0).optional(),
      sprocketTeeth,
    })
    .strict(),
  z
    .object({
      signal: z.number().int().min(0),
      band: z.object({
        engine: engineInput.pick({ make: true, model: true, code: true }).partial({ code: true }),
        circuit,
        condition,
      }),
      sprocketTeeth,
    })
    .strict(),
]);

export const comparisonRow = z.object({
  key: z.string(),
  /** For list values: which of the list, from 1. */
  part: z.number().int().nullable(),
  unit: z.string(),
  here: z.union([z.number(), z.string(), z.boolean(), z.null()]),
  reference: z.union([z.number(), z.string(), z.boolean(), z.null()]),
  low: z.number().nullable(),
  high: z.number().nullable(),
  n: z.number().int(),
  verdict: z.enum(['inside', 'outside', 'undecided']),
  why: z.string(),
});

/** Two traces on one axis, ready to be drawn: values in the signal's unit at equal steps. */
export const overlay = z.object({
  axis: z.enum(['deg', 's']),
  start: z.number(),
  step: z.number(),
  here: z.array(z.number().nullable()),
  reference: z.array(z.number().nullable()),
  low: z.array(z.number().nullable()).nullable(),
  high: z.array(z.number().nullable()).nullable(),
  /** Here less the reference's middle. */
  difference: z.array(z.number().nullable()).optional(),
});

export const comparison = z.object({
  id,
  captureId: id,
  status: z.enum(['queued', 'running', 'ready', 'failed']),
  error: z.string().nullable(),
  engine: z.string().nullable(),
  signal: z.number().int(),
  here: z.object({ title: z.string(), name: z.string(), circuit, unit: z.string() }).nullable(),
  other: z
    .object({
      kind: z.enum(['knownGood', 'capture', 'band']),
      id: id.nullable(),
      title: z.string(),
      signal: z.number().int(),
      n: z.number().int(),
      /** What the reference was made of. */
      members: z.array(z.object({ id, title: z.string(), version: z.number().int() })).optional(),
    })
    .nullable(),
  alignment: z
    .object({
      by: z.enum(['reference mark', 'switch-off', 'edge', 'correlation', 'none']),
      shiftS: z.number().nullable(),
      confidence: z.number(),
      /** What had to be allowed for: another polarity, a probe factor, a missing cam. */
      notes: z.array(z.string()).optional(),
      /** Moved by hand, on top of what was found. */
      byHand: z
        .object({ shift: z.number(), axis: z.enum(['deg', 's']) })
        .nullable()
        .optional(),
    })
    .nullable(),
  adjustment: adjustment.nullable(),
  rows: z.array(comparisonRow),
  shape: z
    .object({
      difference: z.number().nullable(),
      parts: z.array(
        z.object({ from: z.number(), to: z.number(), axis: z.enum(['deg', 's']), text: z.string() }),
      ),
    })
    .nullable(),
  overlay: overlay.nullable(),
  /** How far a cam lies from the reference against the crank, when all of its edges moved alike. */
  camShift: z
    .object({
      deg: z.number(),
      edges: z.number().int(),
      teeth: z.number().nullable(),
      sprocketTeeth: z.number().int().nullable(),
    })
    .nullable()
    .default(null),
  says: z
    .object({ measured: z.string(), usually: z.string(), next: z.string(), cannotTell: z.string() })
    .nullable()
    .default(null),
  text: z.string(),
  createdAt: isoTime,
});
export type ComparisonJson = z.infer<typeof comparison>;

export const comparisonListRow = z.object({
  id,
  captureId: id,
  status: z.enum(['queued', 'running', 'ready', 'failed']),
  here: z.string(),
  circuit: circuit.nullable(),
  other: z.string(),
  outside: z.number().int(),
  rows: z.number().int(),
  by: z.string(),
  createdAt: isoTime,
});
export type ComparisonListRowJson = z.infer<typeof comparisonListRow>;

export const nearestRow = z.object({
  knownGoodId: id,
  signal: z.number().int(),
  engine: engineInput,
  condition,
  note: z.string(),
  distance: z.number(),
  /** Where the two shapes are alike and where they part. */
  why: z.string(),
  portrait: portrait.nullable(),
});
export const nearestAnswer = z.object({
  /** Null with a reason when the signal has no shape. */
  reason: z.string().nullable(),
  searched: z.number().int(),
  portrait: portrait.nullable(),
  items: z.array(nearestRow),
});
export type NearestJson = z.infer<typeof nearestAnswer>;

export const libraryEndpoints = defineEndpoints({
  'knownGoods.create': {
    method: 'POST',
    path: '/known-goods',
    summary: 'Propose signals of a capture as a known-good.',
    access: 'propose',
    body: knownGoodInput,
    response: knownGood,
    successStatus: 201,
  },
  'knownGoods.list': {
    method: 'GET',
    path: '/known-goods',
    summary: 'Known-goods of the current workshop.',
    access: 'seeStaff',
    query: pageQuery.extend({
      search: z.string().max(200).optional(),
      engine: z.string().max(200).optional(),
      circuit: circuit.optional(),
      condition: condition.optional(),
      state: z.enum(KNOWN_GOOD_STATES).optional(),
      wheel: z.string().max(40).optional(),
      /** A capture: those that fit it best come first (same wheel, cylinders, circuits). */
      fit: id.optional(),
    }),
    response: listOf(knownGoodRow),
  },
  'knownGoods.get': {
    method: 'GET',
    path: '/known-goods/{id}',
    summary: 'One known-good with its frozen values and its history.',
    access: 'seeStaff',
    opens: 'knownGood',
    response: knownGood,
  },
  'knownGoods.patch': {
    method: 'PATCH',
    path: '/known-goods/{id}',
    summary: 'Change a proposal that is not published.',
    access: 'propose',
    opens: 'knownGood',
    body: knownGoodInput.omit({ captureId: true, signals: true, supersedes: true }).partial().strict(),
    response: knownGood,
    ifMatch: true,
  },
  'knownGoods.review': {
    method: 'POST',
    path: '/known-goods/{id}/reviews',
    summary: 'Publish, return or retire; never by its author.',
    access: 'review',
    opens: 'knownGood',
    body: z.object({ decision: z.enum(['publish', 'return', 'retire']), note: text(2_000).default('') }),
    response: knownGood,
    successStatus: 201,
  },
  'knownGoods.window': {
    method: 'GET',
    path: '/known-goods/{id}/window',
    summary: 'Frozen samples of a stretch for drawing, in the layout of the captures’ window.',
    access: 'seeStaff',
    opens: 'knownGood',
    query: windowQuery,
    response: windowAnswer,
    inFront: true,
  },
  'captures.nearest': {
    method: 'POST',
    path: '/captures/{id}/nearest',
    summary: 'Published known-goods of the signal’s circuit, nearest shape first.',
    access: 'seeStaff',
    opens: 'capture',
    body: z
      .object({ signal: z.number().int().min(0), limit: z.number().int().min(1).max(50).default(5) })
      .strict(),
    response: nearestAnswer,
  },
  'comparisons.list': {
    method: 'GET',
    path: '/comparisons',
    summary: 'Comparisons of the current workshop, newest first.',
    access: 'seeStaff',
    query: pageQuery.extend({ captureId: id.optional() }),
    response: listOf(comparisonListRow),
  },
  'comparisons.patch': {
    method: 'PATCH',
    path: '/comparisons/{id}',
    summary:
      'Move the alignment by hand, or say how many teeth the crank’s sprocket has; compared anew with the same engine version’s rules.',
    access: 'propose',
    opens: 'comparison',
    body: adjustment.partial().strict(),
    response: comparison,
    ifMatch: true,
  },
  'comparisons.create': {
    method: 'POST',
    path: '/captures/{id}/comparisons',
    summary: 'Compare a signal with a known-good, a band or another capture.',
    access: 'propose',
    opens: 'capture',
    body: comparisonInput,
    response: z.object({ id, status: z.enum(['queued', 'running', 'ready', 'failed']) }),
    successStatus: 201,
  },
  'comparisons.get': {
    method: 'GET',
    path: '/comparisons/{id}',
    summary: 'A comparison: alignment, table, differences and words.',
    access: 'seeStaff',
    opens: 'comparison',
    response: comparison,
  },
});
