import { getActionContext } from 'astro:actions';
import type { APIContext, MiddlewareHandler } from 'astro';
import { NOBODY } from './server/access.ts';
import { shareCaller } from './server/captures/sharing/share-caller.ts';
import { ApiError } from './server/errors.ts';
import { resolveCaller } from './server/http/caller.ts';
import { securityHeaders } from './server/http/headers.ts';
import { checkHost, checkOrigin } from './server/http/origin.ts';
import { authorizeAction, authorizePage, checkApiRoute } from './server/http/page-access.ts';
import { refusalPage } from './server/http/refusal-page.ts';
import { errorAnswer, toApiError, toResponse } from './server/http/respond.ts';
import { newId } from './server/ids.ts';
import { cookieName } from './server/session/cookie-name.ts';

const isApi = (context: APIContext) => context.url.pathname.startsWith('/api/');
const SHARE_PAGE = '/s/[secret]';
/** A form's fields; Astro holds them in memory. */
const FORM_LIMIT = 1024 * 1024;

/** Everything that Astro answers passes here: host, origin, caller and access come before any page, action or route. */
export const onRequest: MiddlewareHandler = async (context, next) => {
  const { locals, request } = context;
  locals.requestId ??= newId();
  locals.caller = NOBODY;
  locals.theme = themeOf(context.cookies.get('theme')?.value);
  let response: Response;
  try {
    await admit(context);
    response = (await formAnswer(context)) ?? (await next());
  } catch (thrown) {
    response = await refusal(context, toApiError(thrown, { requestId: locals.requestId }), (page) =>
      next(page),
    );
  }
  for (const [name, value] of Object.entries(securityHeaders(context.url.pathname))) {
    if (name !== 'Content-Security-Policy' || !response.headers.has(name)) response.headers.set(name, value);
  }
  if (!response.headers.has('Cache-Control')) response.headers.set('Cache-Control', 'no-store');
  response.headers.set('X-Request-Id', locals.requestId);
  // A redirect made by a page keeps the method only where that was meant.
  if (request.method === 'POST' && response.status === 302) return seeOther(response);
  return response;
};

/** Throws unless the request may go on; sets the caller. */
async function admit(context: APIContext): Promise<void> {
  const { locals, request, routePattern } = context;
  const header = (name: string) => request.headers.get(name) ?? undefined;
  const ownOrigin = checkHost(header('host'));
  checkOrigin({ method: request.method, header, ownOrigin, cookieName: cookieName() });
  const action = getActionContext(context).action;
  if (routePattern === SHARE_PAGE) locals.caller = await shareCaller(context.params.secret ?? '');
  else locals.caller = await resolveCaller({ header, address: context.clientAddress });
  if (action !== undefined) {
    // Astro would run an action behind any address, an API route's too.
    if (isApi(context)) throw new ApiError('not_found');
    checkFormSize(header('content-length'));
    authorizeAction(action.name, locals.caller);
  }
  if (isApi(context)) checkApiRoute(routePattern, request.method);
  else if (!(action?.calledFrom === 'rpc'))
    await authorizePage(routePattern, context.params.id, locals.caller);
}

function checkFormSize(contentLength: string | undefined): void {
  const bytes = Number(contentLength ?? Number.NaN);
  if (bytes <= FORM_LIMIT) return;
  throw new ApiError('too_large', { message: 'The form is larger than 1 MiB. Nothing was kept.' });
}

/** Runs a form's action; when it says where to go, goes there, so that a reload does not send the form again. */
async function formAnswer(context: APIContext): Promise<Response | null> {
  const { action, setActionResult, serializeActionResult } = getActionContext(context);
  if (action?.calledFrom !== 'form') return null;
  const result = await action.handler();
  if (result.error === undefined && typeof result.data?.redirectTo === 'string') {
    return context.redirect(result.data.redirectTo, 303);
  }
  setActionResult(action.name, serializeActionResult(result));
  return null;
}

/** The API answers in its error shape; a page sends to sign-in or shows why it is not shown. */
async function refusal(
  context: APIContext,
  error: ApiError,
  show: (page: string) => Promise<Response>,
): Promise<Response> {
  const { request, url, locals, routePattern } = context;
  const isPageRequest = !isApi(context) && !routePattern.startsWith('/_');
  if (!isPageRequest) return toResponse(errorAnswer(error));
  if (error.status === 401 && routePattern !== SHARE_PAGE) {
    return context.redirect(`/sign-in?next=${encodeURIComponent(url.pathname + url.search)}`, 303);
  }
  // Only what has no side effects may go through Astro again: it would run a refused form's action.
  if (request.method !== 'GET' && request.method !== 'HEAD') return refusalPage(error);
  if (error.status === 421) return refusalPage(error);
  locals.refusal = error;
  try {
    return await show('/refused');
  } catch (thrown) {
    toApiError(thrown, { requestId: locals.requestId });
    return refusalPage(error);
  }
}

function seeOther(response: Response): Response {
  return new Response(null, { status: 303, headers: response.headers });
}

const themeOf = (value: string | undefined): 'paper' | 'dim' | null =>
  value === 'paper' || value === 'dim' ? value : null;
