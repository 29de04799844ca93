/**
 * What anybody may see, by route pattern and never by path: "//api/cars" and "/api/cars/" are the same route. Everything else needs
 * a session, and each verb asks for its own right besides.
 */
const PUBLIC_ROUTES: ReadonlySet<string> = new Set([
  '/',
  '/403',
  '/404',
  '/500',
  '/sign-in',
  '/sign-up',
  '/sign-out',
  '/help',
  '/theme',
  '/api/auth/sign-in',
  '/api/auth/sign-up',
  '/api/auth/sign-out',
  '/api/health',
  '/api/openapi.json',
]);

export const isPublicRoute = (routePattern: string): boolean =>
  PUBLIC_ROUTES.has(routePattern) || routePattern.startsWith('/help/');

/** Decides only in which form a refusal is written. */
export const isApiRoute = (routePattern: string): boolean => routePattern.startsWith('/api/');
