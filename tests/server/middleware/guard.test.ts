import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, type MockInstance, vi } from 'vitest';
import { SESSION_COOKIE } from '@/lib/server/auth/lucia';
import { forbidden, notFound } from '@/lib/server/errors';
import { member } from '../auth/people';
import { type CallOptions, fakeCall, makeTestDb, ORIGIN } from '../helpers';

vi.mock('astro/middleware', () => ({ defineMiddleware: (handler: unknown) => handler }));

type OnRequest = (context: unknown, next: () => Promise<Response>) => Promise<Response>;
let onRequest: OnRequest;
let token: string;

beforeAll(async () => {
  // The module opens its database when it is loaded: the test's own is set first.
  await makeTestDb();
  onRequest = (await import('@/middleware')).onRequest as unknown as OnRequest;
  token = (await member()).token;
});
afterAll(() => vi.restoreAllMocks());

const page = async () => new Response('<p>secret</p>', { headers: { 'content-type': 'text/html' } });

async function ask(options: CallOptions, next: () => Promise<Response> = page) {
  const call = fakeCall(options);
  const reached = vi.fn(next);
  const response = await onRequest(call, reached);
  return { call, response, reached: reached.mock.calls.length > 0, text: await response.clone().text() };
}

const signedIn = (options: CallOptions): CallOptions => ({ ...options, cookies: { [SESSION_COOKIE]: token } });

describe('deny by default', () => {
  it.each(['/cars', '/suggestions/[id]', '/anything-new', '/apis', '/helpers'])(
    'sends nobody from %s to sign-in',
    async (routePattern) => {
      const { response, reached } = await ask({ routePattern, url: '/cars?tab=2' });
      expect(reached).toBe(false);
      expect(response.status).toBe(303);
      expect(response.headers.get('location')).toBe('/sign-in?next=%2Fcars%3Ftab%3D2');
    },
  );

  it('answers the API with 401 and JSON', async () => {
    const { response, reached, text } = await ask({ routePattern: '/api/cars' });
    expect(reached).toBe(false);
    expect(response.status).toBe(401);
    expect(JSON.parse(text)).toEqual({ error: { code: 'UNAUTHENTICATED', message: 'Sign in first.' } });
  });

  it.each(['//api/cars', '/api/cars/', '/API/cars', '/%61pi/cars', '/sign-in'])(
    'decides by route and not by path: %s',
    async (url) => {
      const { reached } = await ask({ routePattern: '/api/cars', url: url.startsWith('//') ? `${ORIGIN}${url}` : url });
      expect(reached).toBe(false);
    },
  );

  it.each([
    '/',
    '/sign-in',
    '/sign-up',
    '/help',
    '/help/[topic]',
    '/404',
    '/api/health',
    '/api/openapi.json',
    '/api/auth/sign-in',
  ])('lets anybody see %s', async (routePattern) => {
    expect((await ask({ routePattern })).reached).toBe(true);
  });

  it('lets a member through, with who they are', async () => {
    const { call, reached } = await ask(signedIn({ routePattern: '/cars' }));
    expect(reached).toBe(true);
    expect(call.locals).toMatchObject({ user: { name: 'Ada Field' }, role: 'owner', sessionToken: token });
  });

  it('ignores what a caller wrote into locals', async () => {
    const call = fakeCall({ routePattern: '/cars' });
    Object.assign(call.locals, { user: { id: 'x' }, role: 'owner' });
    expect((await onRequest(call, page)).status).toBe(303);
  });
});

describe('requests of other sites', () => {
  const foreign = 'https://evil.test';
  const post = (headers: Record<string, string>, body: unknown = { a: 1 }): CallOptions =>
    signedIn({ method: 'POST', routePattern: '/api/cars', url: '/api/cars', headers, body });

  it.each([
    ['a foreign Origin', { origin: foreign }],
    ['a foreign Origin that says same-origin', { origin: foreign, 'sec-fetch-site': 'same-origin' }],
    ['cross-site', { 'sec-fetch-site': 'cross-site' }],
    ['cross-site with our Origin', { 'sec-fetch-site': 'cross-site', origin: ORIGIN }],
    ['another host of the same site', { 'sec-fetch-site': 'same-site' }],
    ['another port', { origin: 'http://localhost:4322' }],
    ['a null Origin', { origin: 'null' }],
    ['no Origin beside a cookie', {}],
    ['"none" without Origin', { 'sec-fetch-site': 'none' }],
    ['a host that only ends alike', { origin: 'http://evil-localhost:4321' }],
    ['a forged X-Forwarded-Host', { origin: foreign, 'x-forwarded-host': 'evil.test' }],
  ])('are refused: %s', async (_what, headers) => {
    const { response, reached, text } = await ask(post(headers));
    expect(reached).toBe(false);
    expect(response.status).toBe(403);
    expect(JSON.parse(text).error.code).toBe('FORBIDDEN');
  });

  it.each([
    ['JSON', { a: 1 }],
    ['a form', new URLSearchParams({ a: '1' })],
    ['text', 'a=1'],
  ])('are refused whatever they carry: %s', async (_what, body) => {
    expect((await ask(post({ origin: foreign }, body))).response.status).toBe(403);
  });

  it.each(['POST', 'PUT', 'PATCH', 'DELETE'])('are refused for %s, also on public routes', async (method) => {
    const options = { method, routePattern: '/api/auth/sign-in', headers: { origin: foreign } };
    expect((await ask(options)).response.status).toBe(403);
  });

  it('are told in plain HTML on a page, with nothing of the request in it', async () => {
    const { response, text } = await ask({
      ...post({ origin: foreign }),
      routePattern: '/cars/new',
      url: '/cars/new?<script>',
    });
    expect(response.headers.get('content-type')).toContain('text/html');
    expect(text).not.toContain('<script>');
  });

  it.each([
    ['same-origin', { 'sec-fetch-site': 'same-origin' }],
    ['same-origin with a null Origin', { 'sec-fetch-site': 'same-origin', origin: 'null' }],
    ['our Origin, as an older browser sends it', { origin: ORIGIN }],
    ['"none" with our Origin', { 'sec-fetch-site': 'none', origin: ORIGIN }],
    ['our Origin behind TLS', { origin: ORIGIN.replace('http:', 'https:') }],
  ])('are told apart from our own: %s', async (_what, headers) => {
    expect((await ask(post(headers))).reached).toBe(true);
  });

  it('do not include a script without cookie or with a bearer token', async () => {
    const open = { method: 'POST', routePattern: '/api/auth/sign-in', body: {} };
    expect((await ask(open)).reached).toBe(true);
    const bearer = { ...post({ authorization: 'Bearer token' }), routePattern: '/api/health' };
    const { reached, call } = await ask(bearer);
    expect(reached).toBe(true);
    expect(call.locals.user).toBeNull();
  });

  it('may come from APP_ORIGIN', async () => {
    vi.stubEnv('APP_ORIGIN', 'https://slipband.example/');
    expect((await ask(post({ origin: 'https://slipband.example' }))).reached).toBe(true);
    vi.unstubAllEnvs();
    expect((await ask(post({ origin: 'https://slipband.example' }))).reached).toBe(false);
  });

  it('may read', async () => {
    expect((await ask(signedIn({ routePattern: '/cars', headers: { 'sec-fetch-site': 'cross-site' } }))).reached).toBe(
      true,
    );
  });
});

describe('every answer', () => {
  const EXPECTED = {
    'x-content-type-options': 'nosniff',
    'referrer-policy': 'strict-origin-when-cross-origin',
    'x-frame-options': 'DENY',
  };
  beforeEach(() => vi.unstubAllEnvs());

  it.each([
    ['a page', signedIn({ routePattern: '/cars' })],
    ['a redirect', { routePattern: '/cars' }],
    ['an API refusal', { routePattern: '/api/cars' }],
    ['a cross-site refusal', { routePattern: '/cars', method: 'POST', headers: { origin: 'https://evil.test' } }],
  ] as [string, CallOptions][])('carries the headers: %s', async (_what, options) => {
    const headers = (await ask(options)).response.headers;
    for (const [name, value] of Object.entries(EXPECTED)) expect(headers.get(name), name).toBe(value);
    expect(headers.get('content-security-policy')).toContain("frame-ancestors 'none'");
    expect(headers.get('permissions-policy')).toContain('camera=()');
    expect(headers.get('x-request-id')).toMatch(/^[0-9a-f-]{36}$/);
    expect(headers.get('access-control-allow-origin')).toBeNull();
  });

  it('is not stored when signed in', async () => {
    const cached = async () => new Response('x', { headers: { 'cache-control': 'public, max-age=60' } });
    const { call, response } = await ask({ routePattern: '/', cookies: { [SESSION_COOKIE]: token } }, cached);
    expect(call.locals.user).not.toBeNull();
    expect(response.headers.get('cache-control')).toBe('no-store');
    expect((await ask({ routePattern: '/' }, cached)).response.headers.get('cache-control')).toBe('public, max-age=60');
  });

  it('asks for HTTPS only over HTTPS', async () => {
    const plain = await ask({ routePattern: '/' });
    const secure = await ask({ routePattern: '/', url: 'https://slipband.example/' });
    expect(plain.response.headers.has('strict-transport-security')).toBe(false);
    expect(secure.response.headers.get('strict-transport-security')).toContain('max-age=31536000');
  });

  it('keeps the policy that a page wrote itself, and can change frozen headers', async () => {
    const own = async () => new Response('x', { headers: { 'content-security-policy': "script-src 'sha256-x'" } });
    expect((await ask({ routePattern: '/' }, own)).response.headers.get('content-security-policy')).toBe(
      "script-src 'sha256-x'",
    );
    const frozen = await ask({ routePattern: '/' }, async () => Response.redirect(ORIGIN));
    expect(frozen.response.headers.get('x-frame-options')).toBe('DENY');
  });
});

describe('errors that a page throws', () => {
  const throwing = (error: Error) => async () => {
    throw error;
  };

  it('become the empty 404 that the framework replaces, without a policy that would win over the page', async () => {
    for (const method of ['GET', 'POST']) {
      const options = signedIn({ routePattern: '/cars/[id]', method, headers: { origin: ORIGIN } });
      const { response } = await ask(options, throwing(notFound('car')));
      expect(response.status).toBe(404);
      expect(response.body).toBeNull();
      expect(response.headers.has('content-security-policy')).toBe(false);
      expect(response.headers.get('x-frame-options')).toBe('DENY');
    }
  });

  it('become the page for a role that may not, and plain HTML on a post', async () => {
    const read = await ask(signedIn({ routePattern: '/team' }), throwing(forbidden()));
    expect(read.text).toBe('rewritten to /403');
    const options = signedIn({ routePattern: '/team', method: 'POST', headers: { origin: ORIGIN } });
    const sent = await ask(options, throwing(forbidden()));
    expect(sent.response.status).toBe(403);
    expect(sent.text).toContain('Your role in this team does not allow this.');
  });

  describe('that nobody expected', () => {
    const broken = throwing(new Error('SELECT secret'));
    let logged: MockInstance;
    beforeEach(() => {
      logged = vi.spyOn(console, 'error').mockImplementation(() => undefined);
    });
    afterEach(() => logged.mockRestore());

    it('are logged with the request id and shown as JSON without what happened', async () => {
      const { call, response, text } = await ask(signedIn({ routePattern: '/api/cars' }), broken);
      expect(response.status).toBe(500);
      expect(text).toContain(call.locals.requestId);
      expect(text).not.toContain('SELECT');
      expect(JSON.parse(String(logged.mock.lastCall?.[0]))).toMatchObject({ requestId: call.locals.requestId });
    });

    it('become the empty 500 that the framework replaces by its page, under the same request id', async () => {
      const call = fakeCall(signedIn({ routePattern: '/cars' }));
      const first = await onRequest(call, broken);
      expect([first.status, first.body]).toEqual([500, null]);
      const errorPage = { ...call, request: call.request, routePattern: '/500' };
      const second = await onRequest(errorPage, page);
      expect(second.headers.get('x-request-id')).toBe(first.headers.get('x-request-id'));
    });

    it('become plain HTML when the error page fails too', async () => {
      const { response, text } = await ask({ routePattern: '/500' }, broken);
      expect(response.status).toBe(500);
      expect(text).toContain('Something went wrong');
      expect(text).not.toContain('SELECT');
    });
  });
});

describe('what the API does not have', () => {
  const missing = async () => new Response(null, { status: 404 });

  it('is JSON for a method', async () => {
    const options = { routePattern: '/api/auth/sign-out', url: '/api/auth/sign-out' };
    const { response, text } = await ask(options, missing);
    expect(response.status).toBe(405);
    expect(JSON.parse(text).error).toEqual({ code: 'NO_METHOD', message: 'This address does not answer to GET.' });
  });

  it('is JSON for an address', async () => {
    const { response, text } = await ask({ routePattern: '/404', url: '/api/nothing' }, page);
    expect(response.status).toBe(404);
    expect(JSON.parse(text).error.code).toBe('NOT_FOUND');
  });

  it('stays a page elsewhere', async () => {
    expect((await ask({ routePattern: '/404', url: '/nothing' }, page)).text).toBe('<p>secret</p>');
  });
});
