import { z } from 'zod';
import { defineEndpoints } from '../endpoint.ts';
import { id, isoTime, text } from './common.ts';

export const checkResult = z.enum(['good', 'bad', 'unclear', 'skipped']);
const source = z.object({
  kind: z.enum(['published', 'arithmetic', 'practice', 'memory', 'maker']),
  text: z.string(),
});
const expected = z.object({
  text: z.string(),
  low: z.number().nullable(),
  high: z.number().nullable(),
  source,
});

const readingSpec = z.object({
  reading: z.string(),
  what: z.string(),
  unit: z.string(),
  units: z.array(z.string()),
  expected: expected.nullable(),
});
const findingSpec = z.object({
  finding: z.string(),
  result: z.enum(['good', 'bad']),
  says: z.string(),
  rulesOut: z.array(z.string()),
  pointsAt: z.array(z.string()),
});

export const check = z.object({
  check: z.string(),
  title: z.string(),
  question: z.string(),
  how: z.string(),
  stage: z.string(),
  needs: z.array(z.string()),
  minutes: z.number(),
  risk: z.number().int().min(0).max(3),
  cranks: z.boolean(),
  safety: z.boolean(),
  complaints: z.array(z.string()).nullable(),
  readings: z.array(readingSpec),
  findings: z.array(findingSpec),
  cautions: z.array(z.string()),
  source,
});
export type CheckJson = z.infer<typeof check>;

export const cause = z.object({
  cause: z.string(),
  name: z.string(),
  part: z.string(),
  because: z.string(),
  prove: z.string(),
  provedBy: z.array(z.array(z.object({ check: z.string(), finding: z.string() }))),
  weight: z.record(z.string(), z.number()),
});
export type CauseJson = z.infer<typeof cause>;

const recordedReading = z.object({ what: z.string(), value: z.number(), unit: z.string() });

/** A number may come as a number or as it was typed: 12.6, "12.6" or "12,6". "1,234" is refused with the question what it means. */
const readingInput = z
  .object({
    what: text(120).pipe(z.string().min(1)),
    value: z.union([z.number().finite(), z.string().max(40)]),
    unit: z.string().max(16),
  })
  .strict();

export const checkInput = z
  .object({
    result: checkResult,
    /** Which of the check's findings, where a result alone does not say. */
    finding: z.string().max(60).nullable().default(null),
    readings: z.array(readingInput).max(40).default([]),
    codes: z
      .array(text(40).pipe(z.string().min(1)))
      .max(60)
      .default([]),
    captureIds: z.array(id).max(40).default([]),
    note: text(4_000).default(''),
    /** Why this stands although something speaks against it. */
    stands: text(1_000).default(''),
  })
  .strict();

export const checkRecord = z.object({
  check: z.string(),
  result: checkResult,
  finding: z.string().nullable(),
  readings: z.array(recordedReading),
  codes: z.array(z.string()),
  captureIds: z.array(z.string()),
  note: z.string(),
  stands: z.string(),
  author: z.string(),
  at: isoTime,
  etag: z.string(),
});
export type CheckRecordJson = z.infer<typeof checkRecord>;

const measured = z.object({
  reading: z.string(),
  what: z.string(),
  value: z.number(),
  unit: z.string(),
  captureId: z.string(),
  from: z.string(),
  finding: z.string().nullable(),
  remark: z.string().nullable(),
});

/** A check of one job: what was recorded (null: nothing yet) and what its captures show by themselves. */
export const jobCheck = z.object({
  check: z.string(),
  record: checkRecord.nullable(),
  measured: z.array(measured),
});
export type JobCheckJson = z.infer<typeof jobCheck>;

const because = z.object({
  effect: z.enum(['rules out', 'against', 'fits', 'shows', 'code', 'put back', 'set aside']),
  check: z.string().nullable(),
  text: z.string(),
});

export const next = z.object({
  complaint: z.enum(['cranks-no-start', 'slow-crank', 'misfire', 'stall']),
  complaintGuessed: z.boolean(),
  causes: z.array(
    z.object({
      cause: z.string(),
      name: z.string(),
      state: z.enum(['possible', 'ruled out', 'shown']),
      /** Share of the weight of what is open: how heavily it counts here, no probability that was measured. */
      share: z.number(),
      prove: z.string(),
      because: z.array(because),
    }),
  ),
  checks: z.array(
    z.object({
      check: z.string(),
      title: z.string(),
      why: z.string(),
      settles: z.array(
        z.object({
          finding: z.string(),
          says: z.string(),
          result: z.enum(['good', 'bad']),
          rulesOut: z.array(z.string()),
          pointsAt: z.array(z.string()),
          shows: z.array(z.string()),
        }),
      ),
      minutes: z.number(),
      risk: z.number(),
      needs: z.array(z.string()),
      cautions: z.array(z.string()),
      /** The check that this step makes safe. */
      before: z.string().nullable(),
      again: z.enum(['unclear', 'contradicted']).nullable(),
    }),
  ),
  /** What was taken, in order, and what it did. */
  steps: z.array(
    z.object({
      check: z.string(),
      title: z.string(),
      result: checkResult,
      says: z.string(),
      by: z.enum(['person', 'capture']),
      record: checkRecord.nullable(),
      measured: z.array(measured),
      ruledOut: z.array(z.string()),
      otherwise: z.array(z.object({ says: z.string(), pointsAt: z.array(z.string()) })),
    }),
  ),
  contradictions: z.array(z.object({ kind: z.string(), checks: z.array(z.string()), text: z.string() })),
  alerts: z.array(z.string()),
  held: z.array(z.object({ check: z.string(), title: z.string(), why: z.string() })),
  codes: z.array(
    z.object({
      code: z.string(),
      title: z.string().nullable(),
      titleFrom: z.string().nullable(),
      checks: z.array(z.string()),
    }),
  ),
});
export type NextJson = z.infer<typeof next>;

export const overruleInput = z
  .object({ decision: z.enum(['put back', 'set aside']).nullable(), why: text(1_000).default('') })
  .strict()
  .refine(({ decision, why }) => decision === null || why !== '', { path: ['why'], message: 'say why' });

export const pathEndpoints = defineEndpoints({
  'checks.list': {
    method: 'GET',
    path: '/checks',
    summary:
      'The checks of the trade: question, how, cost, risk, expected values with their source, what each finding settles, cautions.',
    access: 'seeStaff',
    response: z.object({ items: z.array(check), nextCursor: z.null() }),
  },
  'causes.list': {
    method: 'GET',
    path: '/causes',
    summary: 'The causes that the path knows, and what proves each.',
    access: 'seeStaff',
    response: z.object({ items: z.array(cause), nextCursor: z.null() }),
  },
  'jobs.next': {
    method: 'GET',
    path: '/jobs/{id}/next',
    summary:
      'The causes that remain and why, and the checks left, best first, never before what makes them safe.',
    access: 'seeStaff',
    opens: 'job',
    response: next,
  },
  'jobChecks.get': {
    method: 'GET',
    path: '/jobs/{id}/checks/{check}',
    summary: 'What was recorded for a check of a job, and what its captures show by themselves.',
    access: 'seeStaff',
    opens: 'job',
    response: jobCheck,
  },
  'jobChecks.put': {
    method: 'PUT',
    path: '/jobs/{id}/checks/{check}',
    summary: 'Record a check of a job. With If-Match of an earlier answer, a change in between is 412.',
    access: 'changeStaff',
    opens: 'job',
    body: checkInput,
    response: jobCheck,
  },
  'jobCauses.put': {
    method: 'PUT',
    path: '/jobs/{id}/causes/{cause}',
    summary:
      'Overrule the reasoning: put a ruled-out cause back or set one aside, and say why; null takes the word back.',
    access: 'changeStaff',
    opens: 'job',
    body: overruleInput,
    response: next,
  },
});
