import { randomUUID } from 'node:crypto';
import type { APIContext, APIRoute } from 'astro';
import type { ServerContext } from '@/lib/server/context';

export const ORIGIN = 'http://localhost:4321';

export interface CallOptions {
  /** Who calls, as `contextFor` gave it; without it nobody is signed in. */
  as?: ServerContext | null;
  method?: string;
  /** Sent as JSON, but for a string, FormData or URLSearchParams, which are sent as they are. */
  body?: unknown;
  params?: Record<string, string>;
  url?: string;
  headers?: Record<string, string>;
  cookies?: Record<string, string>;
  address?: string;
  routePattern?: string;
}

export interface CookieJar {
  values: Map<string, string>;
  /** What the answer would set, with its attributes; an empty value clears. */
  sent: Map<string, { value: string; options: Record<string, unknown> }>;
}

export type FakeCall = APIContext & { jar: CookieJar };

/** A stand-in for what Astro hands to an endpoint, a page or the middleware. */
export function fakeCall(options: CallOptions = {}): FakeCall {
  const url = new URL(options.url ?? '/', ORIGIN);
  const jar: CookieJar = { values: new Map(Object.entries(options.cookies ?? {})), sent: new Map() };
  const call = {
    request: fakeRequest(url, options, jar),
    url,
    params: options.params ?? {},
    locals: localsOf(options.as),
    cookies: fakeCookies(jar),
    clientAddress: options.address ?? '203.0.113.7',
    routePattern: options.routePattern ?? url.pathname,
    isPrerendered: false,
    response: { status: 200, headers: new Headers() },
    redirect: (path: string, status = 302) => new Response(null, { status, headers: { location: path } }),
    rewrite: async (path: string) => new Response(`rewritten to ${path}`),
    jar,
  };
  return call as unknown as FakeCall;
}

/** Calls an endpoint (`import { GET } from '@/pages/api/cars'`) as a function and reads its JSON. */
export async function callRoute(
  route: APIRoute | ((call: APIContext) => Promise<Response>),
  options: CallOptions = {},
  // biome-ignore lint/suspicious/noExplicitAny: tests look into answers freely
): Promise<{ status: number; headers: Headers; body: any; jar: CookieJar }> {
  const call = fakeCall({ ...options, method: options.method ?? (options.body === undefined ? 'GET' : 'POST') });
  const response = (await route(call)) as Response;
  const text = await response.text();
  const isJson = response.headers.get('content-type')?.includes('json');
  return { status: response.status, headers: response.headers, body: isJson ? JSON.parse(text) : text, jar: call.jar };
}

function fakeRequest(url: URL, options: CallOptions, jar: CookieJar): Request {
  const headers = new Headers({ host: url.host, ...options.headers });
  const cookies = [...jar.values].map(([name, value]) => `${name}=${value}`).join('; ');
  if (cookies) headers.set('cookie', cookies);
  const body = bodyOf(options.body, headers);
  return new Request(url, { method: options.method ?? 'GET', headers, ...(body === undefined ? {} : { body }) });
}

function bodyOf(body: unknown, headers: Headers): BodyInit | undefined {
  if (body === undefined || typeof body === 'string') return body as string | undefined;
  if (body instanceof FormData || body instanceof URLSearchParams) return body;
  headers.set('content-type', 'application/json');
  return JSON.stringify(body);
}

function localsOf(as: ServerContext | null | undefined): App.Locals {
  const requestId = as?.requestId ?? randomUUID();
  if (!as) return { requestId, user: null, team: null, role: null, sessionToken: null };
  return { requestId, user: as.user, team: as.team, role: as.role, sessionToken: null };
}

function fakeCookies(jar: CookieJar) {
  return {
    get: (name: string) => (jar.values.has(name) ? { value: jar.values.get(name) } : undefined),
    has: (name: string) => jar.values.has(name),
    set: (name: string, value: string, options: Record<string, unknown> = {}) => {
      jar.values.set(name, value);
      jar.sent.set(name, { value, options });
    },
    delete: (name: string, options: Record<string, unknown> = {}) => {
      jar.values.delete(name);
      jar.sent.set(name, { value: '', options });
    },
  };
}
