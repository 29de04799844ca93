import { eq } from 'drizzle-orm';
import { team } from '@/db/schema';
import { parsePatch } from '@/lib/forms/fields';
import { teamShape } from '@/lib/forms/team';
import { auditInsert, changedFields } from '../audit';
import { type CurrentTeam, requireCan, type ServerContext } from '../context';

/** Renames the team or switches its units on screen (stored values stay SI). Throws VALIDATION. */
export async function updateTeam(ctx: ServerContext, raw: unknown): Promise<CurrentTeam> {
  requireCan(ctx, 'team:manage');
  const patch = parsePatch(teamShape, raw);
  const after = { ...ctx.team, ...patch };
  const changed = changedFields({ ...ctx.team }, patch);
  if (Object.keys(changed).length === 0) return after;
  await ctx.write((db) =>
    db.batch([
      db.update(team).set(patch).where(eq(team.id, ctx.team.id)),
      auditInsert(db, ctx, 'team.update', { type: 'team', id: ctx.team.id }, changed),
    ]),
  );
  return after;
}
