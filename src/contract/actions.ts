import { z } from 'zod';
import { email, id, text } from './areas/common.ts';
import { webhookInput } from './areas/owner.ts';
import {
  acceptInput,
  codeInput,
  emailInput,
  invitationInput,
  MAIL_SWITCHES,
  passwordInput,
  resetInput,
  withPassword,
} from './areas/people.ts';
import { answerInput, shareLinkInput } from './areas/sharing.ts';
import { auditDays, confirmInput, signInInput, signUpInput } from './areas/workshop.ts';
import type { EndpointId } from './endpoints.ts';
import { ROLES, SCOPES } from './roles.ts';

/** Forms that work without script. Each does what an endpoint does and has that endpoint's row of the access table. */
export const ACTIONS = {
  signUp: 'session.signUp',
  confirmSignUp: 'session.confirmSignUp',
  signIn: 'session.signIn',
  signOut: 'session.signOut',
  switchWorkshop: 'me.workshop',
  patchWorkshop: 'workshop.patch',
  changeRole: 'people.patch',
  createToken: 'tokens.create',
  deleteToken: 'tokens.delete',
  createLink: 'shareLinks.create',
  withdrawLink: 'shareLinks.delete',
  hideAnswer: 'answers.hide',
  answerShared: 'shared.answer',
  signInCode: 'session.code',
  askReset: 'session.askReset',
  resetPassword: 'session.reset',
  confirmEmail: 'session.confirmEmail',
  invite: 'invitations.create',
  withdrawInvitation: 'invitations.delete',
  acceptInvitation: 'invitations.accept',
  removePerson: 'people.remove',
  leaveWorkshop: 'me.leave',
  patchMe: 'me.patch',
  changePassword: 'me.password',
  changeEmail: 'me.email',
  eraseMe: 'me.erase',
  endSession: 'sessions.delete',
  endOtherSessions: 'sessions.deleteOthers',
  beginSecondStep: 'secondStep.begin',
  confirmSecondStep: 'secondStep.confirm',
  renewRecoveryCodes: 'secondStep.renewCodes',
  endSecondStep: 'secondStep.end',
  createWebhook: 'webhooks.create',
  deleteWebhook: 'webhooks.delete',
  endWorkshop: 'workshop.end',
  keepWorkshop: 'workshop.keep',
} as const satisfies Record<string, EndpointId>;

export type ActionName = keyof typeof ACTIONS;

/** Where to go afterwards; anything but a path of our own is ignored. */
const next = z.string().max(500).optional();
const name = text(80).pipe(z.string().min(1));

/** The fields of each form. */
export const ACTION_INPUTS = {
  signUp: signUpInput.extend({ next }),
  confirmSignUp: confirmInput,
  signIn: signInInput.extend({ next }),
  signOut: z.object({}),
  switchWorkshop: z.object({ workshopId: id, next }),
  patchWorkshop: z.object({
    name,
    timeZone: z.string().max(64),
    auditDays: auditDays.optional(),
    etag: z.string().max(40).optional(),
  }),
  changeRole: z.object({ id, role: z.enum(ROLES) }),
  createToken: z.object({
    name,
    scopes: z.array(z.enum(SCOPES)).min(1, 'choose at least one'),
    /** Days until it ends; 90 unless said. */
    days: z.number().int().min(1).max(366).optional(),
  }),
  deleteToken: z.object({ id }),
  createLink: z.object({
    captureId: id,
    question: shareLinkInput.shape.question,
    mayAnswer: z.boolean(),
    days: z.number().int().min(1).max(366).optional(),
  }),
  withdrawLink: z.object({ id }),
  hideAnswer: z.object({ id }),
  answerShared: answerInput.omit({ mark: true }),
  signInCode: codeInput.extend({ next }),
  askReset: z.object({ email }),
  resetPassword: resetInput,
  confirmEmail: confirmInput,
  invite: invitationInput,
  withdrawInvitation: z.object({ id }),
  acceptInvitation: acceptInput,
  removePerson: z.object({ id }),
  leaveWorkshop: z.object({}),
  /** What is ticked comes; what is not is switched off. */
  patchMe: z.object({ name, mails: z.array(z.enum(MAIL_SWITCHES)) }),
  changePassword: passwordInput,
  changeEmail: emailInput,
  eraseMe: withPassword.extend({ name: text(80).optional() }),
  endSession: z.object({ id: z.string().max(64) }),
  endOtherSessions: z.object({}),
  beginSecondStep: withPassword,
  confirmSecondStep: codeInput,
  renewRecoveryCodes: withPassword,
  endSecondStep: withPassword,
  createWebhook: webhookInput,
  deleteWebhook: z.object({ id }),
  endWorkshop: z.object({ name: z.string().max(80), password: z.string().min(1).max(200) }),
  keepWorkshop: z.object({}),
} as const satisfies Record<ActionName, z.AnyZodObject>;
