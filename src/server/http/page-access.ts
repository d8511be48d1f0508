import { ACTIONS } from '../../contract/actions.ts';
import type { Endpoint } from '../../contract/endpoint.ts';
import { ENDPOINTS } from '../../contract/endpoints.ts';
import { PAGE_OPENS, PAGES } from '../../contract/pages.ts';
import { ACCESS } from '../../contract/roles.ts';
import { authorize, type Caller, OPENERS } from '../access.ts';
import { ApiError } from '../errors.ts';

/** Astro writes `[name]` where our tables write `{name}`. */
export const tablePath = (routePattern: string): string => routePattern.replace(/\[(\w+)\]/g, '{$1}');

const isPage = (path: string): path is keyof typeof PAGES => Object.hasOwn(PAGES, path);
const isAction = (name: string): name is keyof typeof ACTIONS => Object.hasOwn(ACTIONS, name);

/** Whether the page may be opened; one without a row does not exist. Pages of one thing open it through the door. */
export async function authorizePage(
  routePattern: string,
  id: string | undefined,
  caller: Caller,
): Promise<void> {
  const path = tablePath(routePattern);
  if (!isPage(path)) throw new ApiError('not_found');
  const endpoint = PAGE_OPENS[path];
  if (endpoint === undefined) return authorize(ACCESS[PAGES[path]], caller);
  const thing = (ENDPOINTS[endpoint] as Endpoint).opens;
  if (thing === undefined) throw new ApiError('not_found');
  await OPENERS[thing](caller, endpoint, id ?? '');
}

/** Whether the form may be sent; an action without a row does not exist. */
export function authorizeAction(name: string, caller: Caller): void {
  if (!isAction(name)) throw new ApiError('not_found');
  authorize(ACTIONS[name], caller);
}

/** An API path that takes other methods is 405 with what it takes; one that is in no row is 404. */
export function checkApiRoute(routePattern: string, method: string): void {
  const path = tablePath(routePattern).replace(/^\/api\/v1(?=\/|$)/, '');
  const rows = Object.values<Endpoint>(ENDPOINTS).filter((row) => row.path === path);
  if (rows.length === 0) throw new ApiError('not_found');
  const wanted = method === 'HEAD' ? 'GET' : method;
  if (rows.some((row) => row.method === wanted && !row.inFront)) return;
  throw new ApiError('method_not_allowed', {
    hint: `It takes ${[...new Set(rows.map((row) => row.method))].join(', ')}.`,
  });
}
