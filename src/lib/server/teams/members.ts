import { asc, eq } from 'drizzle-orm';
import { membership, user } from '@/db/schema';
import type { Role } from '@/lib/domain/permissions';
import { requireCan, type ServerContext } from '../context';

export interface Member {
  name: string;
  role: Role;
}

/** Who is in the team, oldest membership first. Names and roles only: no addresses. */
export async function listMembers(ctx: ServerContext): Promise<Member[]> {
  requireCan(ctx, 'team:view');
  return ctx.db
    .select({ name: user.name, role: membership.role })
    .from(membership)
    .innerJoin(user, eq(user.id, membership.userId))
    .where(eq(membership.teamId, ctx.team.id))
    .orderBy(asc(membership.createdAt), asc(user.name));
}
