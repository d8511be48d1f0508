import { z } from 'zod';
import { defineEndpoints } from '../endpoint.ts';
import { ROLES } from '../roles.ts';
import { email, id, isoTime, listOf, pageQuery, text } from './common.ts';
import { me, password } from './workshop.ts';

const role = z.enum(ROLES);
const name = text(80).pipe(z.string().min(1));
/** The password that the person has now, asked for again where sign-in changes. */
const currentPassword = z.string().min(1).max(200);
const secret = z.string().min(20).max(200);
/** Six digits of the authenticator, or a recovery code; spaces do not count. */
const code = z.string().min(6).max(40);

/** Kinds of mail that a person may switch off. What concerns sign-in always comes. */
export const MAIL_SWITCHES = ['answers', 'mentions'] as const;
export type MailSwitch = (typeof MAIL_SWITCHES)[number];

export const invitation = z.object({
  id,
  email: z.string(),
  role,
  invitedBy: z.string(),
  createdAt: isoTime,
  expiresAt: isoTime,
});
export type InvitationJson = z.infer<typeof invitation>;

export const invitationInput = z.object({ email, role }).strict();
export const acceptInput = z.object({ secret, name: name.optional(), password: password.optional() });
export const resetInput = z.object({ secret, password });
export const codeInput = z.object({ code });
export const passwordInput = z.object({ current: currentPassword, password });
export const emailInput = z.object({ email, password: currentPassword });
export const withPassword = z.object({ password: currentPassword });

export const sessionRow = z.object({
  id: z.string(),
  current: z.boolean(),
  startedAt: isoTime,
  address: z.string(),
  agent: z.string(),
});
export type SessionJson = z.infer<typeof sessionRow>;

export const secondStepState = z.object({ on: z.boolean(), recoveryCodesLeft: z.number().int() });
export type SecondStepJson = z.infer<typeof secondStepState>;

const done = { response: z.null(), successStatus: 204 } as const;
const recoveryCodes = z.object({ recoveryCodes: z.array(z.string()) });

export const peopleEndpoints = defineEndpoints({
  'session.code': {
    method: 'POST',
    path: '/sign-in/code',
    summary: 'The second step of signing in: the authenticator’s code, or a recovery code.',
    access: 'open',
    body: codeInput,
    response: me,
  },
  'session.askReset': {
    method: 'POST',
    path: '/password-resets',
    summary:
      'Ask for a mail with a link to set a new password. The answer is the same for an unknown address.',
    access: 'open',
    body: z.object({ email }),
    ...done,
  },
  'session.reset': {
    method: 'POST',
    path: '/password-resets/use',
    summary: 'Set a new password with the secret of the mailed link. Every session ends.',
    access: 'open',
    body: resetInput,
    ...done,
  },
  'session.confirmEmail': {
    method: 'POST',
    path: '/me/email/confirm',
    summary: 'Take the new address into use with the secret of the mailed link. Every session ends.',
    access: 'open',
    body: z.object({ secret }),
    ...done,
  },
  'invitations.list': {
    method: 'GET',
    path: '/invitations',
    summary: 'Invitations that are open.',
    access: 'seeManage',
    query: pageQuery,
    response: listOf(invitation),
  },
  'invitations.create': {
    method: 'POST',
    path: '/invitations',
    summary: 'Invite somebody by mail. Where no mail can be sent, the link is in the answer, once.',
    access: 'manage',
    body: invitationInput,
    response: invitation.extend({ url: z.string().nullable() }),
    successStatus: 201,
  },
  'invitations.delete': {
    method: 'DELETE',
    path: '/invitations/{id}',
    summary: 'Withdraw an invitation.',
    access: 'manage',
    opens: 'invitation',
    ...done,
  },
  'invitations.accept': {
    method: 'POST',
    path: '/invitations/accept',
    summary:
      'Join by the secret of the mailed link: signed in with the address invited, or with a new account.',
    access: 'open',
    body: acceptInput,
    response: me,
    successStatus: 201,
  },
  'people.remove': {
    method: 'DELETE',
    path: '/people/{id}',
    summary: 'Take somebody out of the workshop. What they made stays, signed.',
    access: 'manage',
    ...done,
  },
  'me.leave': {
    method: 'POST',
    path: '/me/leave',
    summary: 'Leave the current workshop. The last owner cannot.',
    access: 'selfSession',
    ...done,
  },
  'me.patch': {
    method: 'PATCH',
    path: '/me',
    summary: 'Change one’s name, or which mails come.',
    access: 'selfSession',
    body: z
      .object({ name, mutedMail: z.array(z.enum(MAIL_SWITCHES)).max(MAIL_SWITCHES.length) })
      .partial()
      .strict(),
    response: me,
  },
  'me.password': {
    method: 'PUT',
    path: '/me/password',
    summary: 'Change one’s password. The other sessions end; this one begins anew.',
    access: 'selfSession',
    body: passwordInput,
    ...done,
  },
  'me.email': {
    method: 'POST',
    path: '/me/email',
    summary: 'Ask to change one’s address: a mail to the new one holds the link that does it.',
    access: 'selfSession',
    body: emailInput,
    ...done,
  },
  'me.erase': {
    method: 'POST',
    path: '/me/erase',
    summary: 'Erase one’s account. What was made stays, signed with the name given, or as a former member.',
    access: 'selfSession',
    body: withPassword.extend({ name: text(80).optional() }),
    ...done,
  },
  'sessions.list': {
    method: 'GET',
    path: '/sessions',
    summary: 'Where one is signed in.',
    access: 'selfSession',
    response: listOf(sessionRow),
  },
  'sessions.delete': {
    method: 'DELETE',
    path: '/sessions/{id}',
    summary: 'End one of one’s sessions.',
    access: 'selfSession',
    ...done,
  },
  'sessions.deleteOthers': {
    method: 'DELETE',
    path: '/sessions',
    summary: 'End all sessions but this one.',
    access: 'selfSession',
    ...done,
  },
  'secondStep.get': {
    method: 'GET',
    path: '/me/second-step',
    summary: 'Whether signing in takes a code, and how many recovery codes are left.',
    access: 'selfSession',
    response: secondStepState,
  },
  'secondStep.begin': {
    method: 'POST',
    path: '/me/second-step',
    summary: 'Make a key for an authenticator (RFC 6238). It is in use once a code of it was confirmed.',
    access: 'selfSession',
    body: withPassword,
    response: z.object({ key: z.string(), address: z.string() }),
  },
  'secondStep.confirm': {
    method: 'POST',
    path: '/me/second-step/confirm',
    summary: 'Confirm the key with a code. Gives recovery codes, once; the other sessions end.',
    access: 'selfSession',
    body: codeInput,
    response: recoveryCodes,
  },
  'secondStep.renewCodes': {
    method: 'POST',
    path: '/me/second-step/recovery-codes',
    summary: 'Make new recovery codes; the old ones end.',
    access: 'selfSession',
    body: withPassword,
    response: recoveryCodes,
  },
  'secondStep.end': {
    method: 'POST',
    path: '/me/second-step/end',
    summary: 'Sign in without a code again. The other sessions end.',
    access: 'selfSession',
    body: withPassword,
    ...done,
  },
});
