import { z } from 'zod';
import { defineEndpoints } from '../endpoint.ts';
import { finite, id, isoTime, listOf, pageQuery, text } from './common.ts';
import { circuit, notice, value } from './values.ts';

export const CAPTURE_STATUSES = ['queued', 'reading', 'measuring', 'ready', 'failed', 'cancelled'] as const;
export const captureStatus = z.enum(CAPTURE_STATUSES);

/** How a person wants one of the file's columns read. `column` counts the file's columns from 0, time included. */
export const signalRequest = z.object({
  /** Below 0: a derived signal's. */
  column: z.number().int().min(-64).max(4096),
  name: text(200).optional(),
  circuit: circuit.optional(),
  unit: text(20).optional(),
  factor: finite.refine((factor) => factor !== 0, 'must not be 0').optional(),
  offset: finite.optional(),
});
export const signalRequests = z.array(signalRequest).max(256);

/** Fields beside the file, the same in multipart and in the upload metadata (there all are strings). */
export const uploadFields = z.object({
  title: text(200).optional(),
  note: text(2_000).optional(),
  /** A job of the workshop that the capture belongs to. */
  jobId: id.optional(),
  cylinders: z.coerce.number().int().min(1).max(16).optional(),
  signals: z
    .string()
    .max(20_000)
    .transform((json, context) => {
      try {
        return JSON.parse(json) as unknown;
      } catch {
        context.addIssue({ code: 'custom', message: 'is not JSON' });
        return z.NEVER;
      }
    })
    .pipe(signalRequests)
    .optional(),
});

const sourceColumn = z.number().int().min(-64).max(4096);
const ownColumn = z.number().int().min(-64).max(-1);

/** A signal to be made from recorded ones. `of` and `less` are the `column` of signals; `column` is its own, below 0. */
export const derivedRequest = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('low-pass'),
    column: ownColumn,
    of: sourceColumn,
    cutoffHz: z.number().positive().max(1e9),
  }),
  z.object({
    kind: z.literal('moving-mean'),
    column: ownColumn,
    of: sourceColumn,
    lengthS: z.number().positive().max(1e6),
  }),
  z.object({ kind: z.literal('derivative'), column: ownColumn, of: sourceColumn }),
  z.object({ kind: z.literal('integral'), column: ownColumn, of: sourceColumn }),
  z.object({ kind: z.literal('absolute'), column: ownColumn, of: sourceColumn }),
  z.object({ kind: z.literal('difference'), column: ownColumn, of: sourceColumn, less: sourceColumn }),
  z.object({ kind: z.literal('speed'), column: ownColumn, of: sourceColumn }),
]);
export type DerivedJson = z.infer<typeof derivedRequest>;

export const readingHints = z.object({
  encoding: z.enum(['utf-8', 'utf-16le', 'utf-16be', 'windows-1252']).optional(),
  delimiter: z.enum([',', ';', '\t', ' ', '|']).optional(),
  decimal: z.enum(['.', ',']).optional(),
  headerLine: z.number().int().min(1).max(10_000).nullable().optional(),
  timeUnit: z.enum(['s', 'ms', 'us', 'ns', 'min', 'clock']).optional(),
  sampleIntervalS: z.number().positive().finite().optional(),
  columns: z.array(z.number().int().min(0).max(4096)).min(1).max(256).optional(),
  timeColumn: z.number().int().min(0).max(4096).nullable().optional(),
});

export const reading = z.object({
  encoding: z.string(),
  delimiter: z.string(),
  decimal: z.string(),
  timeUnit: z.string().nullable(),
  timeColumn: z.number().nullable(),
  headerLine: z.number().nullable(),
  rows: z.number(),
  rejectedRows: z.array(z.object({ line: z.number(), found: z.string(), expected: z.string() })),
  rejectedCount: z.number(),
  recordedAt: z.string().nullable(),
  remarks: z.array(z.string()),
});

export const captureSignal = z.object({
  index: z.number().int(),
  column: z.number().int(),
  name: z.string(),
  circuit,
  circuitConfidence: z.number(),
  circuitBecause: z.string(),
  unit: z.string(),
  factor: z.number(),
  offset: z.number(),
  /** How a derived signal was made; null for a recorded one. */
  made: z.string().nullable(),
});

export const captureError = z.object({
  code: z.string(),
  message: z.string(),
  hint: z.string().optional(),
  line: z.number().nullable().optional(),
});

export const capture = z.object({
  id,
  workshopId: id,
  title: z.string(),
  note: z.string(),
  jobId: id.nullable(),
  status: captureStatus,
  /** 0 to 1 within the present status. */
  progress: z.number(),
  error: captureError.optional(),
  revision: z.number().int(),
  samplesVersion: z.number().int(),
  sampleRateHz: z.number().nullable(),
  /** Rows of samples, the same for every signal. */
  samples: z.number().int(),
  startS: z.number(),
  durationS: z.number(),
  /** Whether the axis is uneven, and whether values then hold until the next row. */
  axis: z.enum(['even', 'uneven', 'holds']).nullable(),
  sha256: z.string(),
  bytes: z.number().int(),
  fileName: z.string(),
  cylinders: z.number().int().nullable(),
  createdAt: isoTime,
  createdBy: z.object({ id, name: z.string() }),
  deletedAt: isoTime.nullable(),
  signals: z.array(captureSignal),
  /** What people asked to have made from the recorded signals. */
  derived: z.array(derivedRequest),
  reading: reading.nullable(),
});
export type CaptureJson = z.infer<typeof capture>;

/** What a list row shows: the capture without its reading, and the few values that say what it holds. */
export const captureRow = capture.omit({ reading: true }).extend({
  headline: z.array(z.object({ signal: z.number().int(), text: z.string() })),
  notices: z.object({ watch: z.number().int(), bad: z.number().int(), first: z.string().nullable() }),
  marks: z.number().int(),
});
export type CaptureRowJson = z.infer<typeof captureRow>;

export const measurements = z.object({
  capture: id,
  revision: z.number().int(),
  engine: z.string(),
  stale: z.boolean(),
  signals: z.array(
    z.object({ index: z.number().int(), circuit, values: z.array(value), notices: z.array(notice) }),
  ),
  relations: z.array(
    z.object({ signals: z.array(z.number().int()), values: z.array(value), notices: z.array(notice) }),
  ),
});
export type MeasurementsJson = z.infer<typeof measurements>;

/** The found trigger wheel: what turns seconds into crank degrees and tooth numbers. Null when none was found. */
export const wheel = z
  .object({
    signal: z.number().int(),
    pattern: z.string(),
    places: z.number().int().nullable(),
    teethPerTurn: z.number().int(),
    marksS: z.array(z.number()),
    teethS: z.array(z.number()),
    teethDeg: z.array(z.number()),
    toothHeights: z.array(z.number()).nullable(),
    toothAnglesDeg: z.array(z.number()),
  })
  .nullable();
export type WheelJson = z.infer<typeof wheel>;

export const preview = z.object({
  lines: z.array(
    z.object({
      line: z.number().int(),
      cells: z.array(z.string()),
      role: z.enum(['text', 'names', 'units', 'numbers', 'rejected', 'empty']),
    }),
  ),
});

/**
 * Binary window. `columns` 1 to 8192. Layout of the body: see the OpenAPI description of this endpoint.
 */
export const windowQuery = z.object({
  from: z.coerce.number().finite(),
  to: z.coerce.number().finite(),
  columns: z.coerce.number().int().min(1).max(8192),
  signals: z
    .string()
    .regex(/^\d+(,\d+)*$/)
    .transform((list) => list.split(',').map(Number))
    .refine((list) => list.length <= 64, 'at most 64 signals')
    .optional(),
  v: z.coerce.number().int().min(0).optional(),
});

const signalList = z
  .string()
  .regex(/^\d+(,\d+)*$/)
  .transform((list) => list.split(',').map(Number));

export const pictureQuery = z.object({
  from: z.coerce.number().finite().optional(),
  to: z.coerce.number().finite().optional(),
  width: z.coerce.number().int().min(360).max(3200).default(1200),
  theme: z.enum(['paper', 'dim']).default('paper'),
  format: z.enum(['svg', 'png']).default('svg'),
  signals: signalList.refine((list) => list.length <= 16, 'at most 16 signals').optional(),
});

export const windowAnswer = {
  contentType: 'application/octet-stream',
  description:
    'Little-endian. Headers: Gapmark-Layout "columns" or "samples"; Gapmark-Count N; Gapmark-Signals the indices in order; ' +
    'Gapmark-From and Gapmark-To the stretch covered in seconds; Gapmark-Samples-Version. Layout "columns": for each signal ' +
    'in order N times four float32: first, then lowest and highest in the order of time in which they occur, last; ' +
    'column c covers From + c * (To - From) / N, cut at block bounds of the pyramid when samples are dense. Layout ' +
    '"samples" (fewer than four samples a column): when Gapmark-Axis is "uneven" or "holds" first N float64 times, then for ' +
    'each signal N float32; when it is "even" sample i lies at Gapmark-Start + i * Gapmark-Step. Values are as recorded: factor and offset are ' +
    'not applied. NaN is a hole.',
} as const;

export const captureListQuery = pageQuery.extend({
  search: z.string().max(200).optional(),
  circuit: circuit.optional(),
  jobId: id.optional(),
  status: captureStatus.optional(),
});

export const capturePatch = z
  .object({
    title: text(200).pipe(z.string().min(1)),
    note: text(5_000),
    cylinders: z.number().int().min(1).max(16).nullable(),
    jobId: id.nullable(),
    signals: signalRequests,
    reading: readingHints,
    /** The whole list of derived signals, as it shall be. */
    derived: z.array(derivedRequest).max(32),
  })
  .partial()
  .strict();

export const captureEndpoints = defineEndpoints({
  'captures.create': {
    method: 'POST',
    path: '/captures',
    summary: 'Upload a capture of at most 32 MiB as multipart/form-data with the field "file".',
    access: 'upload',
    body: uploadFields,
    bodyKind: 'multipart',
    response: z.object({ id, status: captureStatus }),
    successStatus: 201,
    inFront: true,
  },
  'captures.list': {
    method: 'GET',
    path: '/captures',
    summary: 'Captures of the current workshop, newest first.',
    access: 'see',
    query: captureListQuery,
    response: listOf(captureRow),
  },
  'captures.get': {
    method: 'GET',
    path: '/captures/{id}',
    summary: 'One capture.',
    access: 'see',
    opens: 'capture',
    response: capture,
  },
  'captures.patch': {
    method: 'PATCH',
    path: '/captures/{id}',
    summary:
      'Change title, note, cylinders, signals or how the file is read; the last three read or measure again.',
    access: 'change',
    opens: 'capture',
    body: capturePatch,
    response: capture,
    ifMatch: true,
  },
  'captures.delete': {
    method: 'DELETE',
    path: '/captures/{id}',
    summary: 'Hide a capture; it can be brought back for 30 days.',
    access: 'remove',
    opens: 'capture',
    response: z.null(),
    successStatus: 204,
    ifMatch: true,
  },
  'captures.restore': {
    method: 'POST',
    path: '/captures/{id}/restore',
    summary: 'Bring a hidden capture back.',
    access: 'remove',
    opens: 'capture',
    opensDeleted: true,
    response: capture,
  },
  'captures.cancel': {
    method: 'POST',
    path: '/captures/{id}/cancel',
    summary: 'Stop reading or measuring. The original stays.',
    access: 'change',
    opens: 'capture',
    response: capture,
  },
  'captures.preview': {
    method: 'GET',
    path: '/captures/{id}/preview',
    summary: 'The first lines of the file as they were understood.',
    access: 'see',
    opens: 'capture',
    response: preview,
  },
  'captures.measurements': {
    method: 'GET',
    path: '/captures/{id}/measurements',
    summary: 'Every measured value and notice with the samples behind it.',
    access: 'see',
    opens: 'capture',
    response: measurements,
  },
  'captures.wheel': {
    method: 'GET',
    path: '/captures/{id}/wheel',
    summary:
      'The trigger wheel found in the capture: reference marks and tooth events with their crank degrees.',
    access: 'see',
    opens: 'capture',
    response: wheel,
  },
  'captures.window': {
    method: 'GET',
    path: '/captures/{id}/window',
    summary: 'Samples of a stretch, reduced to four values a column.',
    access: 'see',
    opens: 'capture',
    query: windowQuery,
    response: windowAnswer,
    inFront: true,
  },
  'captures.original': {
    method: 'GET',
    path: '/captures/{id}/original',
    summary: 'The uploaded bytes, unchanged.',
    access: 'see',
    opens: 'capture',
    response: {
      contentType: 'application/octet-stream',
      description: 'The file as it was uploaded, as an attachment.',
    },
    inFront: true,
  },
  'captures.export': {
    method: 'GET',
    path: '/captures/{id}/export',
    summary: 'A stretch as CSV: the shortest text that gives the same float32, times the same double.',
    access: 'see',
    opens: 'capture',
    query: z.object({
      from: z.coerce.number().finite().optional(),
      to: z.coerce.number().finite().optional(),
      format: z.enum(['csv']).default('csv'),
    }),
    response: {
      contentType: 'text/csv',
      description: 'Comma, decimal point, seconds, names with units in line 1.',
    },
    inFront: true,
  },
});

export const pictureEndpoints = defineEndpoints({
  'captures.picture': {
    method: 'GET',
    path: '/captures/{id}/picture',
    summary:
      'A stretch as a picture with title, axes, units, marks and a caption. `width` in CSS pixels; PNG has twice as many.',
    access: 'see',
    opens: 'capture',
    query: pictureQuery,
    response: {
      contentType: 'image/svg+xml',
      description: 'SVG, or image/png with format=png; as an attachment.',
    },
    inFront: true,
  },
});

export const uploadEndpoints = defineEndpoints({
  'uploads.options': {
    method: 'OPTIONS',
    path: '/uploads',
    summary: 'What the tus endpoint can do.',
    access: 'upload',
    bodyKind: 'tus',
    response: { contentType: 'text/plain', description: 'tus 1.0 headers' },
    inFront: true,
  },
  'uploads.create': {
    method: 'POST',
    path: '/uploads',
    summary: 'Begin a resumable upload (tus 1.0).',
    access: 'upload',
    bodyKind: 'tus',
    response: { contentType: 'text/plain', description: 'Location of the upload' },
    successStatus: 201,
    inFront: true,
  },
  'uploads.head': {
    method: 'HEAD',
    path: '/uploads/{id}',
    summary: 'How far an upload has come; a finished one names its capture in Gapmark-Capture.',
    access: 'upload',
    bodyKind: 'tus',
    response: { contentType: 'text/plain', description: 'tus 1.0 headers' },
    inFront: true,
  },
  'uploads.patch': {
    method: 'PATCH',
    path: '/uploads/{id}',
    summary: 'Send more bytes; the answer to the last ones carries Gapmark-Capture.',
    access: 'upload',
    bodyKind: 'tus',
    response: { contentType: 'text/plain', description: 'tus 1.0 headers' },
    successStatus: 204,
    inFront: true,
  },
  'uploads.delete': {
    method: 'DELETE',
    path: '/uploads/{id}',
    summary: 'Give up an unfinished upload.',
    access: 'upload',
    bodyKind: 'tus',
    response: { contentType: 'text/plain', description: 'tus 1.0 headers' },
    successStatus: 204,
    inFront: true,
  },
});
