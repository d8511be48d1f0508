import { defineAction } from 'astro:actions';
import { ACTION_INPUTS } from '../contract/actions.ts';
import { MAIL_SWITCHES } from '../contract/areas/people.ts';
import { OPENERS, personOf } from '../server/access.ts';
import { safeNext } from '../server/http/safe-next.ts';
import { askEmailChange } from '../server/session/ask-email-change.ts';
import { askReset } from '../server/session/ask-reset.ts';
import { changePassword } from '../server/session/change-password.ts';
import { confirmEmail } from '../server/session/confirm-email.ts';
import { eraseMe } from '../server/session/erase-me.ts';
import { patchMe } from '../server/session/patch-me.ts';
import { resetPassword } from '../server/session/reset-password.ts';
import { beginSecondStep } from '../server/session/second-step/begin-second-step.ts';
import { completeSignIn } from '../server/session/second-step/complete-sign-in.ts';
import { confirmSecondStep } from '../server/session/second-step/confirm-second-step.ts';
import { endSecondStep } from '../server/session/second-step/end-second-step.ts';
import { renewRecoveryCodes } from '../server/session/second-step/renew-codes.ts';
import { endOtherSessions, endOwnSession } from '../server/session/sessions.ts';
import { acceptInvitation } from '../server/workshop/invitations/accept-invitation.ts';
import { createInvitation } from '../server/workshop/invitations/create-invitation.ts';
import { withdrawInvitation } from '../server/workshop/invitations/withdraw-invitation.ts';
import { leaveWorkshop } from '../server/workshop/leave-workshop.ts';
import { removePerson } from '../server/workshop/remove-person.ts';
import { browserOf } from './browser.ts';
import { refusing } from './refusing.ts';

const OWN_PAGE = '/workshop/sign-in';

export const peopleActions = {
  signInCode: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.signInCode,
    handler: refusing(async ({ code, next }, context) => {
      const { cookies } = await completeSignIn(code, browserOf(context));
      for (const { name, value, attributes } of cookies) context.cookies.set(name, value, attributes);
      return { redirectTo: safeNext(next) };
    }),
  }),
  askReset: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.askReset,
    handler: refusing(async ({ email }, { clientAddress }) => {
      await askReset(email, clientAddress);
      return { redirectTo: '/reset?sent' };
    }),
  }),
  resetPassword: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.resetPassword,
    handler: refusing(async (input, { clientAddress }) => {
      await resetPassword({ ...input, address: clientAddress });
      return { redirectTo: '/sign-in?set' };
    }),
  }),
  confirmEmail: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.confirmEmail,
    handler: refusing(async ({ secret }, context) => {
      const cookie = await confirmEmail(secret, browserOf(context));
      if (cookie === null) return { redirectTo: '/sign-in?set' };
      context.cookies.set(cookie.name, cookie.value, cookie.attributes);
      return { redirectTo: OWN_PAGE };
    }),
  }),
  /** Where no mail can be sent the page shows the link in its answer, once: no redirect then. */
  invite: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.invite,
    handler: refusing(async (input, { locals, clientAddress }) => {
      const made = await createInvitation(personOf(locals.caller), input, clientAddress);
      return made.url === null
        ? { redirectTo: '/workshop#people', link: null }
        : { redirectTo: null, link: { email: made.email, url: made.url } };
    }),
  }),
  withdrawInvitation: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.withdrawInvitation,
    handler: refusing(async ({ id }, { locals, clientAddress }) => {
      const invitation = await OPENERS.invitation(locals.caller, 'invitations.delete', id);
      await withdrawInvitation(locals.caller, invitation, clientAddress);
      return { redirectTo: '/workshop#people' };
    }),
  }),
  acceptInvitation: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.acceptInvitation,
    handler: refusing(async (input, context) => {
      const { cookie } = await acceptInvitation(input, browserOf(context));
      if (cookie !== null) context.cookies.set(cookie.name, cookie.value, cookie.attributes);
      return { redirectTo: '/captures' };
    }),
  }),
  removePerson: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.removePerson,
    handler: refusing(async ({ id }, { locals, clientAddress }) => {
      await removePerson(personOf(locals.caller), id, clientAddress);
      return { redirectTo: '/workshop#people' };
    }),
  }),
  leaveWorkshop: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.leaveWorkshop,
    handler: refusing(async (_input, { locals, clientAddress }) => {
      await leaveWorkshop(personOf(locals.caller), clientAddress);
      return { redirectTo: '/' };
    }),
  }),
  patchMe: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.patchMe,
    handler: refusing(async ({ name, mails }, { locals }) => {
      const mutedMail = MAIL_SWITCHES.filter((kind) => !mails.includes(kind));
      await patchMe(personOf(locals.caller), { name, mutedMail });
      return { redirectTo: OWN_PAGE };
    }),
  }),
  changePassword: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.changePassword,
    handler: refusing(async (input, context) => {
      const cookie = await changePassword(personOf(context.locals.caller), input, browserOf(context));
      context.cookies.set(cookie.name, cookie.value, cookie.attributes);
      return { redirectTo: `${OWN_PAGE}?changed` };
    }),
  }),
  changeEmail: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.changeEmail,
    handler: refusing(async (input, { locals, clientAddress }) => {
      await askEmailChange(personOf(locals.caller), input, clientAddress);
      return { redirectTo: `${OWN_PAGE}?sent` };
    }),
  }),
  eraseMe: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.eraseMe,
    handler: refusing(async (input, { locals, clientAddress }) => {
      await eraseMe(personOf(locals.caller), input, clientAddress);
      return { redirectTo: '/' };
    }),
  }),
  endSession: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.endSession,
    handler: refusing(async ({ id }, { locals }) => {
      await endOwnSession(personOf(locals.caller), id);
      return { redirectTo: `${OWN_PAGE}#sessions` };
    }),
  }),
  endOtherSessions: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.endOtherSessions,
    handler: refusing(async (_input, { locals }) => {
      await endOtherSessions(personOf(locals.caller));
      return { redirectTo: `${OWN_PAGE}#sessions` };
    }),
  }),
  /** The page shows the key, and later the recovery codes, in its answer, once: no redirect. */
  beginSecondStep: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.beginSecondStep,
    handler: refusing(async ({ password }, { locals, clientAddress }) =>
      beginSecondStep(personOf(locals.caller), password, clientAddress),
    ),
  }),
  confirmSecondStep: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.confirmSecondStep,
    handler: refusing(async ({ code }, context) => {
      const person = personOf(context.locals.caller);
      const { recoveryCodes, cookie } = await confirmSecondStep(person, code, browserOf(context));
      context.cookies.set(cookie.name, cookie.value, cookie.attributes);
      return { recoveryCodes };
    }),
  }),
  renewRecoveryCodes: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.renewRecoveryCodes,
    handler: refusing(async ({ password }, { locals, clientAddress }) => ({
      recoveryCodes: await renewRecoveryCodes(personOf(locals.caller), password, clientAddress),
    })),
  }),
  endSecondStep: defineAction({
    accept: 'form',
    input: ACTION_INPUTS.endSecondStep,
    handler: refusing(async ({ password }, context) => {
      const cookie = await endSecondStep(personOf(context.locals.caller), password, browserOf(context));
      context.cookies.set(cookie.name, cookie.value, cookie.attributes);
      return { redirectTo: OWN_PAGE };
    }),
  }),
};
