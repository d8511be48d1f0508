import { personOf } from '../../../../../server/access.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { browserOfRequest } from '../../../../../server/session/browser.ts';
import { confirmSecondStep } from '../../../../../server/session/second-step/confirm-second-step.ts';

export const POST = route('secondStep.confirm', async ({ caller, body, address, request }) => {
  const person = personOf(caller);
  const browser = browserOfRequest(request, address);
  const { recoveryCodes, cookie } = await confirmSecondStep(person, body.code, browser);
  const headers = { 'Set-Cookie': cookie.serialize() };
  return reply({ recoveryCodes }, { headers, shownOnceFor: person.personId });
});
