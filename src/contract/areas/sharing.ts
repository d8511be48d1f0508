import { z } from 'zod';
import { defineEndpoints } from '../endpoint.ts';
import { capture, measurements, wheel, windowAnswer, windowQuery } from './captures.ts';
import { email, id, isoTime, listOf, text } from './common.ts';
import { mark, markInput } from './marks.ts';

export const shareLinkInput = z.object({
  question: text(1_000).optional(),
  expiresAt: isoTime.optional(),
  mayAnswer: z.boolean().default(true),
  /** A colleague to whom the question and the link go by mail. */
  email: email.optional(),
});

export const shareLink = z.object({
  id,
  question: z.string(),
  mayAnswer: z.boolean(),
  createdAt: isoTime,
  expiresAt: isoTime,
  withdrawnAt: isoTime.nullable(),
  seen: z.number().int(),
  answers: z.number().int(),
  createdBy: z.string(),
});
export type ShareLinkJson = z.infer<typeof shareLink>;

export const answer = z.object({
  id,
  shareLinkId: id,
  name: z.string(),
  text: z.string(),
  createdAt: isoTime,
  mark: mark.nullable(),
});
export type AnswerJson = z.infer<typeof answer>;

export const answerInput = z.object({
  name: text(80).pipe(z.string().min(1, 'please say who you are')),
  text: text(2_000).pipe(z.string().min(1, 'is empty')),
  mark: markInput.nullable().optional(),
});

/** What a link shows: a listed projection. No VIN, plate, e-mail, file name or people beyond who shared it. */
export const sharedCapture = z.object({
  capture: capture
    .pick({
      status: true,
      samplesVersion: true,
      sampleRateHz: true,
      samples: true,
      startS: true,
      durationS: true,
      axis: true,
      cylinders: true,
      title: true,
    })
    .extend({
      signals: z.array(
        z.object({
          index: z.number().int(),
          name: z.string(),
          circuit: z.string(),
          unit: z.string(),
          factor: z.number(),
          offset: z.number(),
        }),
      ),
    }),
  sharedBy: z.string(),
  question: z.string(),
  mayAnswer: z.boolean(),
  expiresAt: isoTime,
  marks: z.array(mark.omit({ etag: true })),
  answers: z.array(answer.omit({ shareLinkId: true, mark: true })),
  wheel,
});
export type SharedCaptureJson = z.infer<typeof sharedCapture>;

export const sharingEndpoints = defineEndpoints({
  'shareLinks.create': {
    method: 'POST',
    path: '/captures/{id}/share-links',
    summary: 'Make a link that opens this capture without an account. Its address is shown once.',
    access: 'change',
    opens: 'capture',
    body: shareLinkInput,
    response: z.object({ id, url: z.string() }),
    successStatus: 201,
  },
  'shareLinks.list': {
    method: 'GET',
    path: '/captures/{id}/share-links',
    summary: 'Links of a capture, without their secrets.',
    access: 'see',
    opens: 'capture',
    response: listOf(shareLink),
  },
  'shareLinks.delete': {
    method: 'DELETE',
    path: '/share-links/{id}',
    summary: 'Withdraw a link.',
    access: 'change',
    opens: 'shareLink',
    response: z.null(),
    successStatus: 204,
  },
  'answers.list': {
    method: 'GET',
    path: '/captures/{id}/answers',
    summary: 'Answers that came through links.',
    access: 'see',
    opens: 'capture',
    response: listOf(answer),
  },
  'answers.hide': {
    method: 'DELETE',
    path: '/answers/{id}',
    summary: 'Hide an answer from the link and the list.',
    access: 'change',
    opens: 'answer',
    response: z.null(),
    successStatus: 204,
  },
  'shared.get': {
    method: 'GET',
    path: '/shared/{secret}',
    summary: 'What the link shows.',
    access: 'shareLook',
    response: sharedCapture,
  },
  'shared.window': {
    method: 'GET',
    path: '/shared/{secret}/window',
    summary: 'Samples behind the link; as /captures/{id}/window, never cached.',
    access: 'shareLook',
    query: windowQuery,
    response: windowAnswer,
    inFront: true,
  },
  'shared.measurements': {
    method: 'GET',
    path: '/shared/{secret}/measurements',
    summary: 'Values behind the link.',
    access: 'shareLook',
    response: measurements,
  },
  'shared.seen': {
    method: 'POST',
    path: '/shared/{secret}/seen',
    summary: 'The trace was drawn: counts one look.',
    access: 'shareLook',
    response: z.null(),
    successStatus: 204,
  },
  'shared.answer': {
    method: 'POST',
    path: '/shared/{secret}/answers',
    summary: 'Answer the question, with a mark if wanted.',
    access: 'shareAnswer',
    body: answerInput,
    response: answer.omit({ shareLinkId: true, mark: true }),
    successStatus: 201,
  },
});
