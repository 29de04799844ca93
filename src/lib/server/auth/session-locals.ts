import type { APIContext } from 'astro';
import { database } from '../runtime';
import { currentTeam, teamsOfUser } from '../teams';
import { sendSessionCookie, sentToken } from './call';
import { readSession } from './lucia';

/**
 * Puts the signed-in user, their team and role into locals, when the cookie holds a live session. A dead cookie is taken back, a
 * moved end is sent again. A request with an Authorization header does not use the cookie.
 */
export async function loadSession(context: Pick<APIContext, 'cookies' | 'locals' | 'request'>): Promise<void> {
  const token = sentToken(context);
  if (!token || context.request.headers.has('authorization')) return;
  const handle = database();
  const session = await readSession(handle, token);
  if (!session) {
    sendSessionCookie(context, '');
    return;
  }
  if (session.fresh) sendSessionCookie(context, token);
  const current = currentTeam(await teamsOfUser(handle.db, session.user.id), session.teamId);
  const { user } = session;
  Object.assign(context.locals, {
    user,
    team: current?.team ?? null,
    role: current?.role ?? null,
    sessionToken: token,
  });
}
