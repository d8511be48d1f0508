/** The one access door: deny by default, membership in every look-up. Others import from here only. */
export { accessOf, authorize } from './access/authorize.ts';
export {
  type Caller,
  NOBODY,
  type PersonCaller,
  personOf,
  type ShareCaller,
  shareOf,
} from './access/caller.ts';
export { captureVisible } from './access/conditions.ts';
export type { AnswerRecord } from './access/doors/answer.ts';
export type { AttemptRecord } from './access/doors/attempt.ts';
export type { CaptureRecord } from './access/doors/capture.ts';
export type { ComparisonRecord } from './access/doors/comparison.ts';
export type { ExerciseRecord } from './access/doors/exercise.ts';
export type { InvitationRecord } from './access/doors/invitation.ts';
export type { JobRecord } from './access/doors/job.ts';
export type { JobEntryRecord } from './access/doors/job-entry.ts';
export type { KnownGoodRecord } from './access/doors/known-good.ts';
export type { MarkRecord } from './access/doors/mark.ts';
export type { PhotoRecord } from './access/doors/photo.ts';
export type { SetRecord } from './access/doors/set.ts';
export type { ShareLinkRecord } from './access/doors/share-link.ts';
export type { WebhookRecord } from './access/doors/webhook.ts';
export { OPENERS, type Opened } from './access/openers.ts';
export { exerciseVisible, setVisible } from './access/teaching-conditions.ts';
