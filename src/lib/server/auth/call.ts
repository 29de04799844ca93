import type { APIContext } from 'astro';
import type { DatabaseHandle } from '@/db/client';
import { database } from '../runtime';
import { SESSION_COOKIE, sessionCookie } from './lucia';

/** What the sign-in verbs need of a request: an endpoint's context and a page's `Astro` both fit. */
export type AuthCall = Pick<APIContext, 'cookies' | 'locals' | 'clientAddress' | 'request'>;

export interface AuthContext {
  handle: DatabaseHandle;
  requestId: string;
  now(): Date;
}

export function authContext(call: AuthCall): AuthContext {
  return { handle: database(), requestId: call.locals.requestId, now: () => new Date() };
}

/** Sends the session cookie, or takes it back when the token is empty. */
export function sendSessionCookie(call: Pick<AuthCall, 'cookies'>, token: string): void {
  const { name, value, options } = sessionCookie(token);
  call.cookies.set(name, value, options);
}

/** The token the browser sent, valid or not. */
export function sentToken(call: Pick<AuthCall, 'cookies'>): string | null {
  return call.cookies.get(SESSION_COOKIE)?.value || null;
}
