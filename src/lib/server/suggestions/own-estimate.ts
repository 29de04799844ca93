import { randomUUID } from 'node:crypto';
import { and, desc, eq } from 'drizzle-orm';
import { ownEstimate, user } from '@/db/schema';
import { ownEstimateFilter, ownEstimateInput } from '@/lib/forms/suggestion';
import { auditInsert } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { type Reader, teamCar, teamRound } from '../lookup';

export type OwnEstimateView = Omit<typeof ownEstimate.$inferSelect, 'teamId'> & { madeByName: string };

/** Records the chief's own forecast for a round, or that it was skipped: never edited afterwards. Slip in percent. */
export async function recordOwnEstimate(ctx: ServerContext, raw: unknown): Promise<OwnEstimateView> {
  requireCan(ctx, 'suggestion:decide');
  const input = ownEstimateInput.parse(raw);
  await teamCar(ctx, input.carId);
  await teamRound(ctx, input.roundId);
  const row = {
    ...input,
    skipped: input.skipped ?? false,
    suggestionId: null,
    id: randomUUID(),
    madeBy: ctx.user.id,
    createdAt: ctx.now().toISOString(),
  };
  const detail = { carId: row.carId, roundId: row.roundId, skipped: row.skipped };
  await ctx.write((db) =>
    db.batch([
      db.insert(ownEstimate).values({ ...row, teamId: ctx.team.id }),
      auditInsert(db, ctx, 'own_estimate.record', { type: 'own_estimate', id: row.id }, detail),
    ]),
  );
  return { ...row, madeByName: ctx.user.name };
}

/** The own estimates for a car's round, newest first. */
export async function listOwnEstimates(ctx: ServerContext, raw: unknown): Promise<OwnEstimateView[]> {
  requireCan(ctx, 'suggestion:view');
  const { carId, roundId } = ownEstimateFilter.parse(raw);
  await teamCar(ctx, carId);
  await teamRound(ctx, roundId);
  return selectEstimates(ctx, carId, roundId);
}

/** The newest own estimate for a car's round; null when none was made. */
export async function latestOwnEstimate(
  ctx: ServerContext,
  carId: string,
  roundId: string,
  db: Reader = ctx.db,
): Promise<OwnEstimateView | null> {
  const [newest] = await selectEstimates(ctx, carId, roundId, db);
  return newest ?? null;
}

async function selectEstimates(ctx: ServerContext, carId: string, roundId: string, db: Reader = ctx.db) {
  const rows = await db
    .select({ estimate: ownEstimate, madeByName: user.name })
    .from(ownEstimate)
    .innerJoin(user, eq(user.id, ownEstimate.madeBy))
    .where(and(eq(ownEstimate.teamId, ctx.team.id), eq(ownEstimate.carId, carId), eq(ownEstimate.roundId, roundId)))
    .orderBy(desc(ownEstimate.createdAt), desc(ownEstimate.id));
  return rows.map(({ estimate: { teamId: _team, ...row }, madeByName }) => ({ ...row, madeByName }));
}
