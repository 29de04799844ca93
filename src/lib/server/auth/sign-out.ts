import { auditInsert } from '../audit';
import { type AuthCall, authContext, sendSessionCookie, sentToken } from './call';
import { endSession } from './lucia';

/** Ends the session of this browser and takes the cookie back; without a session it does nothing. */
export async function signOut(call: AuthCall): Promise<void> {
  const ctx = authContext(call);
  const token = sentToken(call);
  const { user, team } = call.locals;
  if (token) await endSession(ctx.handle, token);
  if (token && user) {
    const actor = { ...ctx, user, team };
    await ctx.handle.write((db) => auditInsert(db, actor, 'auth.sign-out', { type: 'user', id: user.id }));
  }
  sendSessionCookie(call, '');
}
