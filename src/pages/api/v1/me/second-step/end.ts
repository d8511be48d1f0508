import { personOf } from '../../../../../server/access.ts';
import { reply } from '../../../../../server/http/reply.ts';
import { route } from '../../../../../server/http/route.ts';
import { browserOfRequest } from '../../../../../server/session/browser.ts';
import { endSecondStep } from '../../../../../server/session/second-step/end-second-step.ts';

export const POST = route('secondStep.end', async ({ caller, body, address, request }) => {
  const cookie = await endSecondStep(personOf(caller), body.password, browserOfRequest(request, address));
  return reply(null, { headers: { 'Set-Cookie': cookie.serialize() } });
});
