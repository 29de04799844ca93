import { and, asc, desc, eq, isNull } from 'drizzle-orm';
import { car, decision, launchSheet, launchSheetSeen, round, suggestion, user } from '@/db/schema';
import { can } from '@/lib/domain/permissions';
import type { ServerContext } from '../context';

export interface CarState {
  id: string;
  name: string;
  suggestion: { id: string; status: string; createdAt: string } | null;
  decision: { choice: 'accept' | 'adjust' | 'decline'; createdAt: string } | null;
  /** The current launch sheet of the car, whatever round it was made for. */
  sheet: SheetState | null;
}

export interface SheetState {
  version: number;
  roundId: string;
  roundName: string;
  createdAt: string;
  seenBy: string[];
}

/** How far the plan of each car has come; for one round when `roundId` is given. */
export async function carStates(ctx: ServerContext, roundId: string | null): Promise<CarState[]> {
  const cars = await ctx.db
    .select({ id: car.id, name: car.name })
    .from(car)
    .where(and(eq(car.teamId, ctx.team.id), isNull(car.archivedAt)))
    .orderBy(asc(car.name));
  return Promise.all(cars.map(async (one) => ({ ...one, ...(await planOf(ctx, one.id, roundId)) })));
}

async function planOf(ctx: ServerContext, carId: string, roundId: string | null) {
  const [latest, sheet] = await Promise.all([latestSuggestion(ctx, carId, roundId), currentSheet(ctx, carId)]);
  return { suggestion: latest, decision: latest ? await decisionOf(ctx, latest.id) : null, sheet };
}

async function latestSuggestion(ctx: ServerContext, carId: string, roundId: string | null) {
  if (!can(ctx.role, 'suggestion:view')) return null;
  const [row] = await ctx.db
    .select({ id: suggestion.id, status: suggestion.status, createdAt: suggestion.createdAt })
    .from(suggestion)
    .where(
      and(
        eq(suggestion.teamId, ctx.team.id),
        eq(suggestion.carId, carId),
        roundId ? eq(suggestion.roundId, roundId) : undefined,
      ),
    )
    .orderBy(desc(suggestion.createdAt))
    .limit(1);
  return row ?? null;
}

async function decisionOf(ctx: ServerContext, suggestionId: string) {
  const [row] = await ctx.db
    .select({ choice: decision.choice, createdAt: decision.createdAt })
    .from(decision)
    .where(and(eq(decision.teamId, ctx.team.id), eq(decision.suggestionId, suggestionId)));
  return row ?? null;
}

async function currentSheet(ctx: ServerContext, carId: string): Promise<SheetState | null> {
  if (!can(ctx.role, 'sheet:view')) return null;
  const [row] = await ctx.db
    .select({
      id: launchSheet.id,
      version: launchSheet.version,
      roundId: launchSheet.roundId,
      roundName: round.name,
      createdAt: launchSheet.createdAt,
    })
    .from(launchSheet)
    .innerJoin(round, eq(round.id, launchSheet.roundId))
    .where(and(eq(launchSheet.teamId, ctx.team.id), eq(launchSheet.carId, carId)))
    .orderBy(desc(launchSheet.version))
    .limit(1);
  if (!row) return null;
  const { id, ...sheet } = row;
  return { ...sheet, seenBy: await seenBy(ctx, id) };
}

async function seenBy(ctx: ServerContext, sheetId: string): Promise<string[]> {
  const rows = await ctx.db
    .select({ name: user.name })
    .from(launchSheetSeen)
    .innerJoin(user, eq(user.id, launchSheetSeen.userId))
    .where(and(eq(launchSheetSeen.teamId, ctx.team.id), eq(launchSheetSeen.launchSheetId, sheetId)))
    .orderBy(asc(launchSheetSeen.seenAt));
  return rows.map((row) => row.name);
}
