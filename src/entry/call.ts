import type { EndpointId } from '../contract/endpoints.ts';
import { authorize, type PersonCaller, personOf } from '../server/access.ts';
import { resolveCaller } from '../server/http/caller.ts';
import { limitApi } from '../server/http/limits.ts';
import { checkHost, checkOrigin } from '../server/http/origin.ts';
import { cookieName } from '../server/session/cookie-name.ts';
import type { FrontRequest } from './types.ts';

/** Who is asking, within the rate, from a page of ours, and allowed to: what every endpoint for people does first. */
export async function call(front: FrontRequest, endpoint: EndpointId): Promise<PersonCaller> {
  const { header, address, request } = front;
  const caller = await resolveCaller({ header, address });
  await limitApi(caller, address);
  const ownOrigin = checkHost(header('host'));
  checkOrigin({ method: request.method ?? 'GET', header, ownOrigin, cookieName: cookieName() });
  authorize(endpoint, caller);
  return personOf(caller);
}
