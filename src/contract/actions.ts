import { z } from 'zod';
import { id, text } from './areas/common.ts';
import { answerInput, shareLinkInput } from './areas/sharing.ts';
import { confirmInput, signInInput, signUpInput } from './areas/workshop.ts';
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
  patchWorkshop: z.object({ name, timeZone: z.string().max(64), etag: z.string().max(40).optional() }),
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
} as const satisfies Record<ActionName, z.AnyZodObject>;
