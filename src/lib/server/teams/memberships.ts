import { asc, eq } from 'drizzle-orm';
import type { Db } from '@/db/client';
import { membership, team } from '@/db/schema';
import type { Role } from '@/lib/domain/permissions';
import type { CurrentTeam } from '../context';

export interface TeamOfUser {
  team: CurrentTeam;
  role: Role;
}

/** The teams of a user with the role in each, oldest membership first. Read on every request: a lowered role counts at once. */
export async function teamsOfUser(db: Db, userId: string): Promise<TeamOfUser[]> {
  return db
    .select({ team: { id: team.id, name: team.name, units: team.units, demo: team.demo }, role: membership.role })
    .from(membership)
    .innerJoin(team, eq(team.id, membership.teamId))
    .where(eq(membership.userId, userId))
    .orderBy(asc(membership.createdAt), asc(membership.id));
}

/** The team a session works for: the chosen one while the user is in it, else the first. */
export function currentTeam(teams: readonly TeamOfUser[], chosenId: string | null): TeamOfUser | null {
  return teams.find(({ team: { id } }) => id === chosenId) ?? teams[0] ?? null;
}
