import type { Thing } from '../../contract/endpoint.ts';
import { openThrough } from './door.ts';
import { answerDoor } from './doors/answer.ts';
import { attemptDoor } from './doors/attempt.ts';
import { captureDoor } from './doors/capture.ts';
import { comparisonDoor } from './doors/comparison.ts';
import { exerciseDoor } from './doors/exercise.ts';
import { invitationDoor } from './doors/invitation.ts';
import { jobDoor } from './doors/job.ts';
import { jobEntryDoor } from './doors/job-entry.ts';
import { knownGoodDoor } from './doors/known-good.ts';
import { markDoor } from './doors/mark.ts';
import { photoDoor } from './doors/photo.ts';
import { setDoor } from './doors/set.ts';
import { shareLinkDoor } from './doors/share-link.ts';
import { webhookDoor } from './doors/webhook.ts';

/** The way in to each kind of thing. */
export const OPENERS = {
  capture: openThrough(captureDoor),
  mark: openThrough(markDoor),
  shareLink: openThrough(shareLinkDoor),
  answer: openThrough(answerDoor),
  knownGood: openThrough(knownGoodDoor),
  comparison: openThrough(comparisonDoor),
  set: openThrough(setDoor),
  exercise: openThrough(exerciseDoor),
  attempt: openThrough(attemptDoor),
  invitation: openThrough(invitationDoor),
  webhook: openThrough(webhookDoor),
  job: openThrough(jobDoor),
  jobEntry: openThrough(jobEntryDoor),
  photo: openThrough(photoDoor),
} as const satisfies Record<Thing, unknown>;

/** What each kind of thing opens as. */
export type Opened = { readonly [T in Thing]: Awaited<ReturnType<(typeof OPENERS)[T]>> };
