import { and, desc, eq, type SQL } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import { car, decision, event, round, suggestion, track, user } from '@/db/schema';
import { suggestionFilter } from '@/lib/forms/suggestion';
import { requireCan, type ServerContext } from '../context';
import { notFound } from '../errors';
import { teamCar } from '../lookup';
import { getReading, type ReadingView } from '../readings';
import { latestOwnEstimate, type OwnEstimateView } from './own-estimate';
import { type Staleness, staleness } from './staleness';

type SuggestionRow = typeof suggestion.$inferSelect;
type DecisionRow = typeof decision.$inferSelect;

export interface SuggestionSummary {
  id: string;
  carId: string;
  roundId: string;
  roundName: string;
  eventName: string;
  trackName: string;
  timeZone: string;
  status: string;
  passesUsed: number;
  modelVersion: string;
  createdByName: string;
  createdAt: string;
  choice: DecisionRow['choice'] | null;
}

/** A suggestion as it was made, with what became of it. SI; settings in each adjustable's own unit. */
export interface SuggestionView extends Omit<SuggestionRow, 'teamId'>, Omit<SuggestionSummary, 'status'> {
  carName: string;
  /** Whole seconds since it was made. */
  ageS: number;
  reading: ReadingView;
  decision: (Omit<DecisionRow, 'teamId'> & { decidedByName: string }) | null;
  ownEstimate: OwnEstimateView | null;
  /** What has changed since it was made. */
  stale: Staleness;
}

const USUAL_LIMIT = 50;

/** The suggestions of a car, newest first. */
export async function listSuggestions(ctx: ServerContext, raw: unknown): Promise<SuggestionSummary[]> {
  requireCan(ctx, 'suggestion:view');
  const { carId, limit } = suggestionFilter.parse(raw);
  await teamCar(ctx, carId);
  const rows = await selectSuggestions(ctx, eq(suggestion.carId, carId)).limit(limit ?? USUAL_LIMIT);
  return rows.map(summary);
}

/** One suggestion of the team. Throws NOT_FOUND. */
export async function getSuggestion(ctx: ServerContext, suggestionId: string): Promise<SuggestionView> {
  requireCan(ctx, 'suggestion:view');
  const [row] = await selectSuggestions(ctx, eq(suggestion.id, suggestionId));
  if (!row) throw notFound('suggestion');
  const { teamId: _team, ...made } = row.suggestion;
  return {
    ...summary(row),
    ...made,
    carName: row.carName,
    ageS: Math.floor((ctx.now().getTime() - Date.parse(made.createdAt)) / 1000),
    reading: await getReading(ctx, made.readingId),
    decision: decisionView(row),
    ownEstimate: await latestOwnEstimate(ctx, made.carId, made.roundId),
    stale: await staleness(ctx, row.suggestion),
  };
}

/** The stored row. Throws NOT_FOUND. */
export async function suggestionRow(ctx: ServerContext, suggestionId: string): Promise<SuggestionRow> {
  const [row] = await ctx.db
    .select()
    .from(suggestion)
    .where(and(eq(suggestion.id, suggestionId), eq(suggestion.teamId, ctx.team.id)));
  if (!row) throw notFound('suggestion');
  return row;
}

const decider = alias(user, 'decider');

function selectSuggestions(ctx: ServerContext, where: SQL) {
  return ctx.db
    .select({
      suggestion,
      carName: car.name,
      roundName: round.name,
      eventName: event.name,
      trackName: track.name,
      timeZone: track.timeZone,
      createdByName: user.name,
      decision,
      decidedByName: decider.name,
    })
    .from(suggestion)
    .innerJoin(car, eq(car.id, suggestion.carId))
    .innerJoin(round, eq(round.id, suggestion.roundId))
    .innerJoin(event, eq(event.id, round.eventId))
    .innerJoin(track, eq(track.id, event.trackId))
    .innerJoin(user, eq(user.id, suggestion.createdBy))
    .leftJoin(decision, eq(decision.suggestionId, suggestion.id))
    .leftJoin(decider, eq(decider.id, decision.decidedBy))
    .where(and(eq(suggestion.teamId, ctx.team.id), where))
    .orderBy(desc(suggestion.createdAt), desc(suggestion.id))
    .$dynamic();
}

type Selected = Awaited<ReturnType<typeof selectSuggestions>>[number];

function summary({ suggestion: made, decision: decided, ...names }: Selected): SuggestionSummary {
  const { id, carId, roundId, status, passesUsed, modelVersion, createdAt } = made;
  const { roundName, eventName, trackName, timeZone, createdByName } = names;
  const places = { roundName, eventName, trackName, timeZone, createdByName };
  return {
    id,
    carId,
    roundId,
    status,
    passesUsed,
    modelVersion,
    createdAt,
    ...places,
    choice: decided?.choice ?? null,
  };
}

function decisionView({ decision: decided, decidedByName }: Selected): SuggestionView['decision'] {
  if (!decided) return null;
  const { teamId: _team, ...row } = decided;
  return { ...row, decidedByName: decidedByName ?? '' };
}
