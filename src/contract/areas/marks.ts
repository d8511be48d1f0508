import { z } from 'zod';
import { defineEndpoints } from '../endpoint.ts';
import { finite, id, isoTime, listOf, text } from './common.ts';

const markFields = z.object({
  kind: z.enum(['point', 'range', 'level']),
  /** Index of the signal; null: the mark belongs to the time axis. */
  signal: z.number().int().min(0).max(255).nullable(),
  from: finite,
  to: finite.nullable(),
  /** In the signal's unit, factor and offset applied. */
  value: finite.nullable(),
  text: text(2_000),
});

export const markInput = markFields.superRefine((mark, context) => {
  if (mark.kind === 'range' && (mark.to === null || mark.to < mark.from))
    context.addIssue({ code: 'custom', path: ['to'], message: 'a range ends at or after its start' });
  if (mark.kind === 'level' && mark.value === null)
    context.addIssue({ code: 'custom', path: ['value'], message: 'a level needs a value' });
});

export const mark = markFields.extend({
  id,
  author: z.string(),
  /** Whether it came with an answer through a share link. */
  fromAnswer: z.boolean(),
  createdAt: isoTime,
  updatedAt: isoTime,
  etag: z.string(),
});
export type MarkJson = z.infer<typeof mark>;

export const markEndpoints = defineEndpoints({
  'marks.list': {
    method: 'GET',
    path: '/captures/{id}/marks',
    summary: 'Marks of a capture, in order of time.',
    access: 'see',
    opens: 'capture',
    response: listOf(mark),
  },
  'marks.create': {
    method: 'POST',
    path: '/captures/{id}/marks',
    summary: 'Pin a mark to the trace.',
    access: 'change',
    opens: 'capture',
    body: markInput,
    response: mark,
    successStatus: 201,
  },
  'marks.patch': {
    method: 'PATCH',
    path: '/marks/{id}',
    summary: 'Change a mark.',
    access: 'change',
    opens: 'mark',
    body: markFields.partial().strict(),
    response: mark,
    ifMatch: true,
  },
  'marks.delete': {
    method: 'DELETE',
    path: '/marks/{id}',
    summary: 'Take a mark away; it can be brought back for 30 days.',
    access: 'change',
    opens: 'mark',
    response: z.null(),
    successStatus: 204,
    ifMatch: true,
  },
  'marks.restore': {
    method: 'POST',
    path: '/marks/{id}/restore',
    summary: 'Bring a mark back.',
    access: 'change',
    opens: 'mark',
    opensDeleted: true,
    response: mark,
  },
});
