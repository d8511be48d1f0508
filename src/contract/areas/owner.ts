import { z } from 'zod';
import { defineEndpoints } from '../endpoint.ts';
import { id, isoTime, listOf, pageQuery } from './common.ts';

/** The address told of events: http or https, without a name and password in it. What lies inward is refused later. */
export const webhookAddress = z
  .string()
  .trim()
  .max(2_000)
  .url()
  .refine((address) => /^https?:\/\//i.test(address), 'begins with http:// or https://');

export const webhookInput = z.object({ url: webhookAddress }).strict();

export const webhook = z.object({
  id,
  url: z.string(),
  events: z.array(z.string()),
  createdBy: z.string(),
  createdAt: isoTime,
});
export type WebhookJson = z.infer<typeof webhook>;

export const delivery = z.object({
  id,
  event: z.string(),
  captureId: z.string().nullable(),
  state: z.enum(['waiting', 'delivered', 'given up']),
  tries: z.number().int(),
  /** The last answer's status; null when none came. */
  status: z.number().int().nullable(),
  error: z.string().nullable(),
  createdAt: isoTime,
  triedAt: isoTime.nullable(),
});
export type DeliveryJson = z.infer<typeof delivery>;

export const ownerEndpoints = defineEndpoints({
  'webhooks.list': {
    method: 'GET',
    path: '/webhooks',
    summary: 'Addresses that are told of events, without their keys.',
    access: 'seeManage',
    response: listOf(webhook),
  },
  'webhooks.create': {
    method: 'POST',
    path: '/webhooks',
    summary:
      'Tell an address when a capture is measured. The key that signs (HMAC-SHA256 over time, a full stop and the body) is shown once.',
    access: 'manage',
    body: webhookInput,
    response: z.object({ id, key: z.string() }),
    successStatus: 201,
  },
  'webhooks.delete': {
    method: 'DELETE',
    path: '/webhooks/{id}',
    summary: 'Stop telling this address.',
    access: 'manage',
    opens: 'webhook',
    response: z.null(),
    successStatus: 204,
  },
  'webhooks.deliveries': {
    method: 'GET',
    path: '/webhooks/{id}/deliveries',
    summary: 'What was sent to this address, newest first, and what became of it.',
    access: 'seeManage',
    opens: 'webhook',
    query: pageQuery,
    response: listOf(delivery),
  },
  'workshop.end': {
    method: 'POST',
    path: '/workshop/end',
    summary: 'Have the workshop deleted with all that is in it, in 30 days. Until then it can be kept.',
    access: 'selfManage',
    body: z.object({ name: z.string().max(80), password: z.string().min(1).max(200) }).strict(),
    response: z.object({ endsAt: isoTime }),
  },
  'workshop.keep': {
    method: 'POST',
    path: '/workshop/keep',
    summary: 'Keep the workshop after all.',
    access: 'selfManage',
    response: z.null(),
    successStatus: 204,
  },
  'workshop.export': {
    method: 'GET',
    path: '/workshop/export',
    summary: 'The whole workshop as a zip that another installation reads back.',
    access: 'selfManage',
    inFront: true,
    response: { contentType: 'application/zip', description: 'The zip, streamed.' },
  },
  'workshop.import': {
    method: 'POST',
    path: '/workshops/import',
    summary: 'Make a new workshop from such a zip, with new ids; its originals are measured again.',
    access: 'selfSession',
    bodyKind: 'multipart',
    body: z.object({}),
    inFront: true,
    response: z.object({ id, name: z.string(), captures: z.number().int() }),
    successStatus: 201,
  },
});
