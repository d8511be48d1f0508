import { personOf } from '../../../../../server/access.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { beginSecondStep } from '../../../../../server/session/second-step/begin-second-step.ts';
import { secondStepState } from '../../../../../server/session/second-step/state.ts';

export const GET = route('secondStep.get', async ({ caller }) =>
  reply(await secondStepState(personOf(caller).personId)),
);

export const POST = route('secondStep.begin', async ({ caller, body, address }) => {
  const person = personOf(caller);
  return reply(await beginSecondStep(person, body.password, address), { shownOnceFor: person.personId });
});
