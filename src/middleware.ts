import { randomUUID } from 'node:crypto';
import type { APIContext, MiddlewareNext } from 'astro';
import { defineMiddleware } from 'astro/middleware';
import { signInPath } from '@/lib/server/auth';
import { isOwnRequest } from '@/lib/server/auth/own-request';
import { loadSession } from '@/lib/server/auth/session-locals';
import { AppError, unauthenticated } from '@/lib/server/errors';
import { asAppError, errorResponse, shownError } from '@/lib/server/http';
import { plainErrorPage } from '@/lib/server/plain-page';
import { isApiRoute, isPublicRoute } from '@/lib/server/public-routes';
import { startRuntime } from '@/lib/server/runtime';
import { withSecurityHeaders } from '@/lib/server/security-headers';

await startRuntime();

/** Request id, session, cross-site check, deny by default, headers. Who may do what is asked by each verb. */
export const onRequest = defineMiddleware(async (context, next) => {
  const requestId = requestIdOf(context.request);
  Object.assign(context.locals, { requestId, user: null, team: null, role: null, sessionToken: null });
  const response = await answer(context, next);
  const https = context.url.protocol === 'https:';
  return withSecurityHeaders(response, { https, signedIn: context.locals.user !== null, requestId });
});

// The error page is a second round of the same request: what it shows must be the number that was logged.
const requestIds = new WeakMap<Request, string>();

function requestIdOf(request: Request): string {
  const id = requestIds.get(request) ?? randomUUID();
  requestIds.set(request, id);
  return id;
}

async function answer(context: APIContext, next: MiddlewareNext): Promise<Response> {
  try {
    if (context.isPrerendered) return await next();
    if (!isOwnRequest(context.request, context.url)) return await refuse(context, crossSite());
    await loadSession(context);
    if (!context.locals.user && !isPublicRoute(context.routePattern)) return askToSignIn(context);
    return withApiMisses(context, await next());
  } catch (error) {
    // The dev server shows the stack itself.
    if (!asAppError(error) && import.meta.env.MODE === 'development') throw error;
    return refuse(context, shownError(error, context.locals.requestId));
  }
}

const crossSite = (): AppError =>
  new AppError(
    'FORBIDDEN',
    'This request did not come from this site. Open the page again and retry; a script sends Origin.',
  );

/** JSON for the API; for a reader the page of that status, or a bare one where that cannot be shown. */
async function refuse(context: APIContext, error: AppError): Promise<Response> {
  if (isApiRoute(context.routePattern)) return errorResponse(error, context.locals.requestId);
  if (error.code === 'UNAUTHENTICATED') return askToSignIn(context);
  if (isStyled(error) && context.routePattern !== `/${error.status}`)
    return new Response(null, { status: error.status });
  if (error.code !== 'FORBIDDEN' || context.request.method !== 'GET') return plainErrorPage(error);
  return context.rewrite('/403');
}

// An empty 404 or 500 is what the framework replaces with the page of that name.
const isStyled = ({ code }: AppError): boolean => code === 'NOT_FOUND' || code === 'INTERNAL';

/** An address or a method that no endpoint has: JSON as everywhere under /api, where the framework would show its 404 page. */
function withApiMisses(context: APIContext, response: Response): Response {
  const { requestId } = context.locals;
  const isEmptyMiss = response.status === 404 && response.body === null && context.request.method !== 'HEAD';
  if (isApiRoute(context.routePattern) && isEmptyMiss) return errorResponse(noSuchMethod(context), requestId);
  const isUnknown = context.routePattern === '/404' && isApiRoute(context.url.pathname);
  return isUnknown ? errorResponse(new AppError('NOT_FOUND', 'There is no such address here.'), requestId) : response;
}

const noSuchMethod = ({ request }: APIContext): AppError =>
  new AppError('NO_METHOD', `This address does not answer to ${request.method}.`);

function askToSignIn(context: APIContext): Response {
  if (isApiRoute(context.routePattern)) return errorResponse(unauthenticated(), context.locals.requestId);
  return context.redirect(signInPath(context.url, context.request.method), 303);
}
