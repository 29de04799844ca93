const SAFE_METHODS: ReadonlySet<string> = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Whether a request that may change something comes from our own pages (or from no browser at all). Asked for every method but
 * GET, HEAD and OPTIONS, whatever the body's type:
 * - an Origin, when sent, must be ours;
 * - Sec-Fetch-Site, when sent, must be same-origin ("none" counts only together with our Origin);
 * - with neither header no browser is at work: allowed unless a cookie is sent, so a script with a cookie must send Origin.
 *   A bearer token is never sent by itself, so it needs neither.
 */
export function isOwnRequest(
  request: Request,
  url: URL,
  appOrigin: string | undefined = process.env.APP_ORIGIN,
): boolean {
  if (SAFE_METHODS.has(request.method)) return true;
  const { headers } = request;
  const origin = headers.get('origin');
  const site = headers.get('sec-fetch-site');
  const ours = origin !== null && isOwnOrigin(origin, headers.get('host') ?? url.host, appOrigin);
  if (origin !== null && origin !== 'null' && !ours) return false;
  if (site !== null) return site === 'same-origin' || (site === 'none' && ours);
  if (origin !== null) return ours;
  return headers.has('authorization') || !headers.has('cookie');
}

// The scheme is left out: behind a proxy that ends TLS the process cannot know it, and the host is what tells sites apart.
function isOwnOrigin(origin: string, host: string, appOrigin: string | undefined): boolean {
  if (appOrigin && origin === appOrigin.replace(/\/+$/, '')) return true;
  return URL.canParse(origin) && new URL(origin).host === host.toLowerCase();
}
