import { personOf } from '../../../../../server/access.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { renewRecoveryCodes } from '../../../../../server/session/second-step/renew-codes.ts';

export const POST = route('secondStep.renewCodes', async ({ caller, body, address }) => {
  const person = personOf(caller);
  const recoveryCodes = await renewRecoveryCodes(person, body.password, address);
  return reply({ recoveryCodes }, { shownOnceFor: person.personId });
});
