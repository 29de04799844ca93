import type { Role } from '@/lib/domain/permissions';
import type { ServerContext, SignedInUser } from '../context';
import { teamsOfUser } from './memberships';

export interface Me {
  user: SignedInUser;
  team: { id: string; name: string; units: 'us' | 'metric' };
  role: Role;
  teams: { id: string; name: string; role: Role }[];
}

/** Who is signed in, for which team, with which role, and the other teams they may switch to. */
export async function me(ctx: ServerContext): Promise<Me> {
  const { id, name, units } = ctx.team;
  const teams = await teamsOfUser(ctx.db, ctx.user.id);
  return {
    user: ctx.user,
    team: { id, name, units },
    role: ctx.role,
    teams: teams.map((entry) => ({ id: entry.team.id, name: entry.team.name, role: entry.role })),
  };
}
