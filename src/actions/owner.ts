import { defineAction } from 'astro:actions';
import { ACTION_INPUTS } from '../contract/actions.ts';
import { OPENERS, personOf } from '../server/access.ts';
import { endWorkshop, keepWorkshop } from '../server/workshop/end-workshop.ts';
import { createWebhook } from '../server/workshop/webhooks/create-webhook.ts';
import { deleteWebhook } from '../server/workshop/webhooks/delete-webhook.ts';
import { refusing } from './refusing.ts';

const OWNER_PAGE = '/workshop/owner';

export const ownerActions = {
  /** The page shows the key in its answer, once: no redirect. */
  createWebhook: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.createWebhook,
    handler: refusing(async ({ url }, { locals, clientAddress }) =>
      createWebhook(personOf(locals.caller), url, clientAddress),
    ),
  }),
  deleteWebhook: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.deleteWebhook,
    handler: refusing(async ({ id }, { locals, clientAddress }) => {
      const webhook = await OPENERS.webhook(locals.caller, 'webhooks.delete', id);
      await deleteWebhook(locals.caller, webhook, clientAddress);
      return { redirectTo: OWNER_PAGE };
    }),
  }),
  endWorkshop: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.endWorkshop,
    handler: refusing(async (input, { locals, clientAddress }) => {
      await endWorkshop(personOf(locals.caller), input, clientAddress);
      return { redirectTo: `${OWNER_PAGE}#end` };
    }),
  }),
  keepWorkshop: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.keepWorkshop,
    handler: refusing(async (_input, { locals, clientAddress }) => {
      await keepWorkshop(personOf(locals.caller), clientAddress);
      return { redirectTo: `${OWNER_PAGE}#end` };
    }),
  }),
};
