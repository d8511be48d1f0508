import { z } from 'zod';
import { defineEndpoints } from '../endpoint.ts';
import { captureRow } from './captures.ts';
import { finite, id, isoTime, listOf, pageQuery, text } from './common.ts';

/** `waiting`: for a part, the customer or another workshop. */
export const JOB_STATES = ['open', 'waiting', 'closed'] as const;
export const jobState = z.enum(JOB_STATES);

const vehicleFields = z.object({
  make: text(80),
  model: text(80),
  year: z.number().int().min(1900).max(2100).nullable(),
  /** Displacement, fuel, code: as the workshop says it. */
  engine: text(120),
  /** As typed, in capitals. A check digit that does not fit is told in `vinWarning`, never refused. */
  vin: text(40).transform((vin) => vin.toUpperCase()),
  plate: text(20),
  cylinders: z.number().int().min(1).max(16).nullable(),
});
export const vehicle = vehicleFields;

/** Trouble codes as they were typed. */
export const troubleCodes = z.array(text(20).pipe(z.string().min(1))).max(60);

export const outcome = z.object({
  cause: text(500).default(''),
  part: text(500).default(''),
  /** What showed it: the reading or the trace before and after. */
  proof: text(2_000).default(''),
  note: text(2_000).default(''),
});

const complaint = text(2_000).pipe(z.string().min(1, 'say what the vehicle does or does not do'));

export const jobInput = z
  .object({
    vehicle: vehicleFields.partial().default({}),
    complaint,
    codes: troubleCodes.default([]),
    /** Who works on it; the caller unless said. */
    assigneeId: id.nullable().optional(),
  })
  .strict();

export const jobPatch = z
  .object({
    /** Only the fields named change. */
    vehicle: vehicleFields.partial().strict(),
    complaint,
    codes: troubleCodes,
    assigneeId: id.nullable(),
    state: jobState,
    outcome: outcome.nullable(),
  })
  .partial()
  .strict();

const who = z.object({ id, name: z.string() });

export const job = z.object({
  id,
  workshopId: id,
  /** Counts up within the workshop; shown as J-0412. */
  number: z.number().int(),
  vehicle,
  /** Why the VIN may be mistyped; null when it fits or there is none. */
  vinWarning: z.string().nullable(),
  complaint: z.string(),
  codes: z.array(z.string()),
  state: jobState,
  assignee: who.nullable(),
  outcome: outcome.nullable(),
  createdBy: who,
  createdAt: isoTime,
  updatedAt: isoTime,
  closedAt: isoTime.nullable(),
  closedBy: who.nullable(),
  deletedAt: isoTime.nullable(),
  etag: z.string(),
});
export type JobJson = z.infer<typeof job>;

/** What a list row shows. */
export const jobRow = job.extend({
  captures: z.number().int(),
  photos: z.number().int(),
  entries: z.number().int(),
});
export type JobRowJson = z.infer<typeof jobRow>;

export const jobListQuery = pageQuery.extend({
  /** Words that must all be found: in vehicle, plate, VIN, complaint, codes, outcome, notes, readings, captures' titles. */
  search: z.string().max(200).optional(),
  state: jobState.optional(),
  /** A person's id, or `me`. */
  assignee: z.union([z.literal('me'), id]).optional(),
});

/** A note, or a number read from a gauge or meter. */
export const jobEntryInput = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('note'), text: text(5_000).pipe(z.string().min(1, 'is empty')) }).strict(),
  z
    .object({
      kind: z.literal('reading'),
      what: text(200).pipe(z.string().min(1, 'say what was read')),
      value: finite,
      unit: text(20).default(''),
      text: text(2_000).default(''),
    })
    .strict(),
]);

export const jobEntryPatch = z
  .object({ text: text(5_000), what: text(200).pipe(z.string().min(1)), value: finite, unit: text(20) })
  .partial()
  .strict();

export const jobEntry = z.object({
  id,
  /** `event`: what the product noted by itself, such as a hand-over. */
  kind: z.enum(['note', 'reading', 'event']),
  text: z.string(),
  what: z.string().nullable(),
  value: z.number().nullable(),
  unit: z.string().nullable(),
  by: z.string(),
  at: isoTime,
  etag: z.string(),
});
export type JobEntryJson = z.infer<typeof jobEntry>;

export const photo = z.object({
  id,
  jobId: id,
  caption: z.string(),
  /** Key of the check that it belongs to. */
  check: z.string().nullable(),
  width: z.number().int(),
  height: z.number().int(),
  bytes: z.number().int(),
  contentType: z.enum(['image/jpeg', 'image/png', 'image/webp']),
  by: z.string(),
  at: isoTime,
  etag: z.string(),
});
export type PhotoJson = z.infer<typeof photo>;

/** Fields beside the picture. */
export const photoFields = z.object({
  caption: text(500).optional(),
  /** Key of the check that it belongs to. */
  check: z
    .string()
    .regex(/^[a-z0-9-]{1,60}$/)
    .optional(),
});

export const timelineItem = z.discriminatedUnion('type', [
  z.object({ type: z.literal('entry'), at: isoTime, entry: jobEntry }),
  z.object({ type: z.literal('photo'), at: isoTime, photo }),
  z.object({ type: z.literal('capture'), at: isoTime, capture: captureRow }),
]);
export type TimelineItemJson = z.infer<typeof timelineItem>;

export const jobEndpoints = defineEndpoints({
  'jobs.list': {
    method: 'GET',
    path: '/jobs',
    summary: 'Jobs of the current workshop, newest first.',
    access: 'seeStaff',
    query: jobListQuery,
    response: listOf(jobRow),
  },
  'jobs.create': {
    method: 'POST',
    path: '/jobs',
    summary: 'Open a job for a vehicle.',
    access: 'changeStaff',
    body: jobInput,
    response: job,
    successStatus: 201,
  },
  'jobs.get': {
    method: 'GET',
    path: '/jobs/{id}',
    summary: 'One job.',
    access: 'seeStaff',
    opens: 'job',
    response: job,
  },
  'jobs.patch': {
    method: 'PATCH',
    path: '/jobs/{id}',
    summary:
      'Change vehicle, complaint, codes, who works on it, state or outcome; closing one that is closed is 409.',
    access: 'changeStaff',
    opens: 'job',
    body: jobPatch,
    response: job,
    ifMatch: true,
  },
  'jobs.delete': {
    method: 'DELETE',
    path: '/jobs/{id}',
    summary: 'Hide a job; it can be brought back for 30 days. Its captures stay.',
    access: 'removeStaff',
    opens: 'job',
    response: z.null(),
    successStatus: 204,
    ifMatch: true,
  },
  'jobs.restore': {
    method: 'POST',
    path: '/jobs/{id}/restore',
    summary: 'Bring a hidden job back.',
    access: 'removeStaff',
    opens: 'job',
    opensDeleted: true,
    response: job,
  },
  'jobs.timeline': {
    method: 'GET',
    path: '/jobs/{id}/timeline',
    summary: 'Notes, readings, photos and captures of a job, oldest first.',
    access: 'seeStaff',
    opens: 'job',
    response: listOf(timelineItem),
  },
  'jobs.report': {
    method: 'GET',
    path: '/jobs/{id}/report',
    summary: 'The job as a report, as a page or as a tagged PDF; the same job gives the same bytes.',
    access: 'seeStaff',
    opens: 'job',
    query: z.object({
      /** In plain words, or with all numbers. */
      for: z.enum(['customer', 'colleague']).default('colleague'),
      format: z.enum(['html', 'pdf']).default('html'),
    }),
    response: {
      contentType: 'text/html',
      description: 'A page without scripts; application/pdf when asked for.',
    },
    inFront: true,
  },
  'jobEntries.create': {
    method: 'POST',
    path: '/jobs/{id}/entries',
    summary: 'Add a note, or a reading from a gauge or meter.',
    access: 'changeStaff',
    opens: 'job',
    body: jobEntryInput,
    response: jobEntry,
    successStatus: 201,
  },
  'jobEntries.patch': {
    method: 'PATCH',
    path: '/job-entries/{id}',
    summary: 'Change a note or a reading.',
    access: 'changeStaff',
    opens: 'jobEntry',
    body: jobEntryPatch,
    response: jobEntry,
    ifMatch: true,
  },
  'jobEntries.delete': {
    method: 'DELETE',
    path: '/job-entries/{id}',
    summary: 'Take a note or a reading away; it can be brought back for 30 days.',
    access: 'removeStaff',
    opens: 'jobEntry',
    response: z.null(),
    successStatus: 204,
    ifMatch: true,
  },
  'jobEntries.restore': {
    method: 'POST',
    path: '/job-entries/{id}/restore',
    summary: 'Bring a note or a reading back.',
    access: 'removeStaff',
    opens: 'jobEntry',
    opensDeleted: true,
    response: jobEntry,
  },
  'photos.create': {
    method: 'POST',
    path: '/jobs/{id}/photos',
    summary:
      'Add a photo (JPEG, PNG or WebP, at most 25 MiB and 50 megapixels) as multipart/form-data with the field "file". It is ' +
      'decoded and written anew, without place and device.',
    access: 'changeStaff',
    opens: 'job',
    body: photoFields,
    bodyKind: 'multipart',
    response: photo,
    successStatus: 201,
    inFront: true,
  },
  'photos.list': {
    method: 'GET',
    path: '/jobs/{id}/photos',
    summary: 'Photos of a job, oldest first.',
    access: 'seeStaff',
    opens: 'job',
    response: listOf(photo),
  },
  'photos.image': {
    method: 'GET',
    path: '/photos/{id}/image',
    summary: 'The picture itself, whole or small.',
    access: 'seeStaff',
    opens: 'photo',
    query: z.object({ size: z.enum(['whole', 'small']).default('whole') }),
    response: {
      contentType: 'image/jpeg',
      description: 'JPEG, PNG or WebP, as `contentType` says; small ones are JPEG.',
    },
    inFront: true,
  },
  'photos.patch': {
    method: 'PATCH',
    path: '/photos/{id}',
    summary: 'Change a photo’s caption.',
    access: 'changeStaff',
    opens: 'photo',
    body: z.object({ caption: text(500) }).strict(),
    response: photo,
    ifMatch: true,
  },
  'photos.delete': {
    method: 'DELETE',
    path: '/photos/{id}',
    summary: 'Take a photo away; it can be brought back for 30 days.',
    access: 'removeStaff',
    opens: 'photo',
    response: z.null(),
    successStatus: 204,
    ifMatch: true,
  },
  'photos.restore': {
    method: 'POST',
    path: '/photos/{id}/restore',
    summary: 'Bring a photo back.',
    access: 'removeStaff',
    opens: 'photo',
    opensDeleted: true,
    response: photo,
  },
});
