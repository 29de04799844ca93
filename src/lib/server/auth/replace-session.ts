import { type AuthCall, type AuthContext, sendSessionCookie, sentToken } from './call';
import { endSession, startSession } from './lucia';

/** A new session for this browser; the one it had ends, and a planted token is never taken over. */
export async function replaceSession(
  call: AuthCall,
  { handle }: AuthContext,
  userId: string,
  teamId: string | null,
): Promise<void> {
  const previous = sentToken(call);
  if (previous) await endSession(handle, previous);
  sendSessionCookie(call, await startSession(handle, userId, teamId));
}
