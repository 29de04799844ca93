/** Every answer of the server carries these; a page's own Content-Security-Policy (with its script hashes) stays. */
const ALWAYS: Readonly<Record<string, string>> = {
  'x-content-type-options': 'nosniff',
  'referrer-policy': 'strict-origin-when-cross-origin',
  'x-frame-options': 'DENY',
  'permissions-policy': 'camera=(), microphone=(), payment=(), usb=(), geolocation=(self)',
  'cross-origin-opener-policy': 'same-origin',
  'cross-origin-resource-policy': 'same-origin',
};

/** For JSON, files and bare error pages: nothing may run, load or frame. */
const BARE_CSP = "default-src 'none'; base-uri 'none'; object-src 'none'; form-action 'self'; frame-ancestors 'none'";
const ONE_YEAR_HSTS = 'max-age=31536000; includeSubDomains';

interface Circumstances {
  https: boolean;
  signedIn: boolean;
  requestId: string;
}

export function withSecurityHeaders(response: Response, { https, signedIn, requestId }: Circumstances): Response {
  const answer = mutable(response);
  const { headers } = answer;
  for (const [name, value] of Object.entries(ALWAYS)) headers.set(name, value);
  if (needsPolicy(answer)) headers.set('content-security-policy', BARE_CSP);
  if (https) headers.set('strict-transport-security', ONE_YEAR_HSTS);
  if (signedIn) headers.set('cache-control', 'no-store');
  headers.set('x-request-id', requestId);
  return answer;
}

const needsPolicy = (answer: Response): boolean =>
  !answer.headers.has('content-security-policy') && !isReplaced(answer) && !isDevPage(answer.headers);

// The framework swaps an empty 404 or 500 for its error page; headers set here would win over the page's own policy.
const isReplaced = ({ status, body }: Response): boolean => (status === 404 || status === 500) && body === null;

// Response.redirect() and fetched answers have frozen headers.
function mutable(response: Response): Response {
  try {
    response.headers.set('x-content-type-options', 'nosniff');
    return response;
  } catch {
    return new Response(response.body, response);
  }
}

// The dev server writes no policy of its own for pages; the bare one would block their styles and scripts.
const isDevPage = (headers: Headers): boolean =>
  import.meta.env.MODE === 'development' && headers.get('content-type')?.includes('text/html') === true;
