/** The only module that knows the session library. It is no longer maintained, so it must be replaceable here alone. */
import { and, eq, ne } from 'drizzle-orm';
import { Lucia, TimeSpan } from 'lucia';
import type { DatabaseHandle } from '@/db/client';
import { session as sessionTable } from '@/db/schema';
import type { SignedInUser } from '../context';
import { HashedSessionAdapter, sha256Hex } from './hashed-adapter';

declare module 'lucia' {
  interface Register {
    DatabaseSessionAttributes: { teamId: string | null; absoluteExpiresAt: number; createdAt: string };
    DatabaseUserAttributes: { name: string; email: string };
  }
}

const IDLE = new TimeSpan(14, 'd');
const ABSOLUTE_S = new TimeSpan(60, 'd').seconds();
/** The prefix makes browsers insist on Secure, Path=/ and no Domain. They treat localhost as secure. */
export const SESSION_COOKIE = '__Host-session';

export interface LiveSession {
  token: string;
  user: SignedInUser;
  /** The team chosen last; it may have been left since. */
  teamId: string | null;
  /** The end was moved: send the cookie again. */
  fresh: boolean;
}

export interface SessionCookie {
  name: string;
  value: string;
  options: { httpOnly: true; secure: true; sameSite: 'lax'; path: '/'; maxAge: number };
}

function createAuth(handle: DatabaseHandle) {
  return new Lucia(new HashedSessionAdapter(handle), {
    sessionExpiresIn: IDLE,
    sessionCookie: { name: SESSION_COOKIE, attributes: { secure: true, sameSite: 'lax', path: '/' } },
    getSessionAttributes: ({ teamId }) => ({ teamId }),
    getUserAttributes: ({ name, email }) => ({ name, email }),
  });
}

const known = new WeakMap<DatabaseHandle, ReturnType<typeof createAuth>>();

function auth(handle: DatabaseHandle): ReturnType<typeof createAuth> {
  const made = known.get(handle) ?? createAuth(handle);
  known.set(handle, made);
  return made;
}

/** The session of a token, moved on by use; null when it is unknown, ended, or its user is disabled. */
export async function readSession(handle: DatabaseHandle, token: string): Promise<LiveSession | null> {
  const { session, user } = await auth(handle).validateSession(token);
  if (!session) return null;
  const { id, name, email } = user as unknown as SignedInUser;
  const { teamId } = session as unknown as { teamId: string | null };
  return { token, user: { id, name, email }, teamId, fresh: session.fresh };
}

/** Makes a session with a new random token; only the hash of it is stored. */
export async function startSession(handle: DatabaseHandle, userId: string, teamId: string | null): Promise<string> {
  const now = Date.now();
  const created = await auth(handle).createSession(userId, {
    teamId,
    absoluteExpiresAt: Math.floor(now / 1000) + ABSOLUTE_S,
    createdAt: new Date(now).toISOString(),
  });
  return created.id;
}

export function endSession(handle: DatabaseHandle, token: string): Promise<void> {
  return auth(handle).invalidateSession(token);
}

/** Ends every session of a user, but the one of `exceptToken`. */
export async function endUserSessions(handle: DatabaseHandle, userId: string, exceptToken?: string): Promise<void> {
  const keep = exceptToken === undefined ? undefined : ne(sessionTable.id, sha256Hex(exceptToken));
  await handle.write((db) => db.delete(sessionTable).where(and(eq(sessionTable.userId, userId), keep)));
}

/** Remembers which of their teams a session works for. */
export async function setSessionTeam(handle: DatabaseHandle, token: string, teamId: string): Promise<void> {
  await handle.write((db) =>
    db
      .update(sessionTable)
      .set({ teamId })
      .where(eq(sessionTable.id, sha256Hex(token))),
  );
}

export function endExpiredSessions(handle: DatabaseHandle): Promise<void> {
  return auth(handle).deleteExpiredSessions();
}

/** The cookie of a token; an empty token clears it. */
export function sessionCookie(token: string): SessionCookie {
  const maxAge = token === '' ? 0 : IDLE.seconds();
  return {
    name: SESSION_COOKIE,
    value: token,
    options: { httpOnly: true, secure: true, sameSite: 'lax', path: '/', maxAge },
  };
}
