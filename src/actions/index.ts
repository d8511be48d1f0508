import { defineAction } from 'astro:actions';
import { ACTION_INPUTS } from '../contract/actions.ts';
import { OPENERS, personOf, shareOf } from '../server/access.ts';
import { addAnswer } from '../server/captures/sharing/add-answer.ts';
import { createLink } from '../server/captures/sharing/create-link.ts';
import { hideAnswer } from '../server/captures/sharing/hide-answer.ts';
import { withdrawLink } from '../server/captures/sharing/withdraw-link.ts';
import { safeNext } from '../server/http/safe-next.ts';
import { confirmSignUp } from '../server/session/confirm-sign-up.ts';
import { createToken } from '../server/session/create-token.ts';
import { deleteToken } from '../server/session/delete-token.ts';
import { signIn } from '../server/session/sign-in.ts';
import { signOut } from '../server/session/sign-out.ts';
import { signUp } from '../server/session/sign-up.ts';
import { switchWorkshop } from '../server/session/switch-workshop.ts';
import { changeRole } from '../server/workshop/change-role.ts';
import { patchWorkshop } from '../server/workshop/patch-workshop.ts';
import { browserOf, endAfter } from './browser.ts';
import { ownerActions } from './owner.ts';
import { peopleActions } from './people.ts';
import { refusing } from './refusing.ts';

export const server = {
  ...peopleActions,
  ...ownerActions,
  signUp: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.signUp,
    handler: refusing(async ({ next, ...input }, context) => {
      const { cookie } = await signUp({ ...input, ...browserOf(context) });
      if (cookie === null) return { redirectTo: '/sign-up?sent' };
      context.cookies.set(cookie.name, cookie.value, cookie.attributes);
      return { redirectTo: safeNext(next) };
    }),
  }),
  confirmSignUp: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.confirmSignUp,
    handler: refusing(async ({ secret }, context) => {
      const { cookie } = await confirmSignUp({ secret, ...browserOf(context) });
      context.cookies.set(cookie.name, cookie.value, cookie.attributes);
      return { redirectTo: '/captures' };
    }),
  }),
  signIn: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.signIn,
    handler: refusing(async ({ next, ...input }, context) => {
      const joining = safeNext(next).startsWith('/invitation');
      const { step, cookie } = await signIn({ ...input, joining, ...browserOf(context) });
      context.cookies.set(cookie.name, cookie.value, cookie.attributes);
      const onward = safeNext(next);
      return { redirectTo: step === 'code' ? `/sign-in/code?next=${encodeURIComponent(onward)}` : onward };
    }),
  }),
  signOut: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.signOut,
    handler: refusing(async (_input, context) => {
      const cookie = await signOut(browserOf(context).cookieHeader);
      context.cookies.set(cookie.name, cookie.value, cookie.attributes);
      return { redirectTo: '/' };
    }),
  }),
  switchWorkshop: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.switchWorkshop,
    handler: refusing(async ({ workshopId, next }, { locals }) => {
      await switchWorkshop(personOf(locals.caller).personId, workshopId);
      return { redirectTo: safeNext(next) };
    }),
  }),
  patchWorkshop: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.patchWorkshop,
    handler: refusing(async ({ etag, ...patch }, { locals, clientAddress }) => {
      await patchWorkshop(personOf(locals.caller), patch, etag, clientAddress);
      return { redirectTo: '/workshop' };
    }),
  }),
  changeRole: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.changeRole,
    handler: refusing(async ({ id, role }, { locals, clientAddress }) => {
      await changeRole(personOf(locals.caller), id, role, clientAddress);
      return { redirectTo: '/workshop' };
    }),
  }),
  /** The page shows the token in its answer, once: no redirect. */
  createToken: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.createToken,
    handler: refusing(async ({ days, ...input }, { locals, clientAddress }) =>
      createToken(personOf(locals.caller), { ...input, expiresAt: endAfter(days) }, clientAddress),
    ),
  }),
  deleteToken: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.deleteToken,
    handler: refusing(async ({ id }, { locals, clientAddress }) => {
      await deleteToken(personOf(locals.caller), id, clientAddress);
      return { redirectTo: '/workshop' };
    }),
  }),
  /** The page shows the link in its answer, once: no redirect. */
  createLink: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.createLink,
    handler: refusing(async ({ captureId, days, ...input }, { locals, clientAddress }) => {
      const capture = await OPENERS.capture(locals.caller, 'shareLinks.create', captureId);
      const link = { ...input, expiresAt: endAfter(days) };
      return createLink(personOf(locals.caller), capture, link, clientAddress);
    }),
  }),
  withdrawLink: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.withdrawLink,
    handler: refusing(async ({ id }, { locals, clientAddress }) => {
      const link = await OPENERS.shareLink(locals.caller, 'shareLinks.delete', id);
      await withdrawLink(locals.caller, link, clientAddress);
      return { redirectTo: `/captures/${link.captureId}` };
    }),
  }),
  hideAnswer: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.hideAnswer,
    handler: refusing(async ({ id }, { locals, clientAddress }) => {
      const answer = await OPENERS.answer(locals.caller, 'answers.hide', id);
      await hideAnswer(locals.caller, answer, clientAddress);
      return { redirectTo: `/captures/${answer.captureId}` };
    }),
  }),
  answerShared: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.answerShared,
    handler: refusing(async (input, { locals, clientAddress, url }) => {
      await addAnswer(shareOf(locals.caller), input, clientAddress);
      return { redirectTo: `${url.pathname}#answers` };
    }),
  }),
};
