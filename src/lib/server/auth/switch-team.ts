import { switchTeamInput } from '@/lib/forms/auth';
import { notFound, unauthenticated } from '../errors';
import { type TeamOfUser, teamsOfUser } from '../teams';
import { type AuthCall, authContext } from './call';
import { setSessionTeam } from './lucia';

/** Makes this session work for another of the user's teams, from the next request on. Throws NOT_FOUND or UNAUTHENTICATED. */
export async function switchTeam(call: AuthCall, raw: unknown): Promise<TeamOfUser> {
  const { user, sessionToken } = call.locals;
  if (!user || !sessionToken) throw unauthenticated();
  const { handle } = authContext(call);
  const { teamId } = switchTeamInput.parse(raw);
  const chosen = (await teamsOfUser(handle.db, user.id)).find((entry) => entry.team.id === teamId);
  if (!chosen) throw notFound('team');
  await setSessionTeam(handle, sessionToken, teamId);
  return chosen;
}
