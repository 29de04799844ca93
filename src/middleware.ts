import { randomUUID } from 'node:crypto';
import type { APIContext, MiddlewareNext } from 'astro';
import { defineMiddleware } from 'astro/middleware';
import { signInPath } from '@/lib/server/auth';
import { isOwnRequest } from '@/lib/server/auth/own-request';
import { loadSession } from '@/lib/server/auth/session-locals';
import { AppError, type ErrorCode, unauthenticated } from '@/lib/server/errors';
import { asAppError, errorResponse } from '@/lib/server/http';
import { plainErrorPage } from '@/lib/server/plain-page';
import { isApiRoute, isPublicRoute } from '@/lib/server/public-routes';
import { startRuntime } from '@/lib/server/runtime';
import { withSecurityHeaders } from '@/lib/server/security-headers';

await startRuntime();

/** Request id, session, cross-site check, deny by default, headers. Who may do what is asked by each verb. */
export const onRequest = defineMiddleware(async (context, next) => {
  const requestId = randomUUID();
  Object.assign(context.locals, { requestId, user: null, team: null, role: null, sessionToken: null });
  const response = await answer(context, next);
  const https = context.url.protocol === 'https:';
  return withSecurityHeaders(response, { https, signedIn: context.locals.user !== null, requestId });
});

async function answer(context: APIContext, next: MiddlewareNext): Promise<Response> {
  try {
    if (context.isPrerendered) return await next();
    if (!isOwnRequest(context.request, context.url)) return await refuse(context, crossSite());
    await loadSession(context);
    if (!context.locals.user && !isPublicRoute(context.routePattern)) return askToSignIn(context);
    return await next();
  } catch (error) {
    const known = asAppError(error);
    if (!known) throw error;
    return await refuse(context, known);
  }
}

const crossSite = (): AppError =>
  new AppError(
    'FORBIDDEN',
    'This request did not come from this site. Open the page again and retry; a script sends Origin.',
  );

/** JSON for the API; for a reader the team-styled page of that status, or a bare one where that cannot be shown. */
async function refuse(context: APIContext, error: AppError): Promise<Response> {
  if (isApiRoute(context.routePattern)) return errorResponse(error, context.locals.requestId);
  if (error.code === 'UNAUTHENTICATED') return askToSignIn(context);
  const page = context.request.method === 'GET' ? STYLED_PAGES[error.code] : undefined;
  if (!page) return plainErrorPage(error);
  const shown = await context.rewrite(page);
  return new Response(shown.body, { status: error.status, headers: shown.headers });
}

const STYLED_PAGES: Partial<Record<ErrorCode, string>> = { NOT_FOUND: '/404', FORBIDDEN: '/403' };

function askToSignIn(context: APIContext): Response {
  if (isApiRoute(context.routePattern)) return errorResponse(unauthenticated(), context.locals.requestId);
  return context.redirect(signInPath(context.url, context.request.method), 303);
}
