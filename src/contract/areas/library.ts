import { z } from 'zod';
import { defineEndpoints } from '../endpoint.ts';
import { wheel } from './captures.ts';
import { finite, id, isoTime, listOf, pageQuery, text } from './common.ts';
import { circuit, notice, value } from './values.ts';

export const CONDITIONS = ['cranking', 'idle', 'part load', 'full load', 'key on', 'bench', 'other'] as const;
export const condition = z.enum(CONDITIONS);
export const KNOWN_GOOD_STATES = ['proposed', 'published', 'returned', 'retired'] as const;

export const engineInput = z.object({
  make: text(80).pipe(z.string().min(1)),
  model: text(80).pipe(z.string().min(1)),
  code: text(40).default(''),
  year: z.number().int().min(1900).max(2100).nullable().default(null),
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
});

export const knownGood = z.object({
  id,
  state: z.enum(KNOWN_GOOD_STATES),
  engine: engineInput,
  condition,
  note: z.string(),
  provenance: z.string(),
  captureId: id.nullable(),
  fromS: z.number(),
  toS: z.number(),
  engineVersion: z.string().nullable(),
  signals: z.array(
    z.object({
      index: z.number().int(),
      name: z.string(),
      circuit,
      unit: z.string(),
      factor: z.number(),
      offset: z.number(),
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
  createdBy: z.object({ id, name: z.string() }),
  createdAt: isoTime,
  publishedAt: isoTime.nullable(),
});
export type KnownGoodJson = z.infer<typeof knownGood>;

export const knownGoodRow = knownGood.omit({ wheel: true, relations: true, reviews: true }).extend({
  signals: z.array(z.object({ index: z.number().int(), name: z.string(), circuit, unit: z.string() })),
});
export type KnownGoodRowJson = z.infer<typeof knownGoodRow>;

export const comparisonInput = z.union([
  z
    .object({
      signal: z.number().int().min(0),
      knownGoodId: id,
      otherSignal: z.number().int().min(0).optional(),
    })
    .strict(),
  z
    .object({
      signal: z.number().int().min(0),
      captureId: id,
      otherSignal: z.number().int().min(0).optional(),
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
    })
    .nullable(),
  alignment: z
    .object({
      by: z.enum(['reference mark', 'switch-off', 'edge', 'correlation', 'none']),
      shiftS: z.number().nullable(),
      confidence: z.number(),
    })
    .nullable(),
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
  text: z.string(),
  createdAt: isoTime,
});
export type ComparisonJson = z.infer<typeof comparison>;

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
    body: knownGoodInput.omit({ captureId: true, signals: true }).partial().strict(),
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
