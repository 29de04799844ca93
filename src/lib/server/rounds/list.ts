import { and, asc, desc, eq } from 'drizzle-orm';
import { event, round, track } from '@/db/schema';
import { roundFilter } from '@/lib/forms/round';
import { requireCan, type ServerContext } from '../context';
import { notFound } from '../errors';

export type RoundView = Omit<typeof round.$inferSelect, 'teamId'> & {
  eventName: string;
  trackId: string;
  trackName: string;
  timeZone: string;
};

/** The team's rounds, newest event first, in the order of the event; of one event when `eventId` is given. */
export async function listRounds(ctx: ServerContext, filter: unknown = {}): Promise<RoundView[]> {
  requireCan(ctx, 'team:view');
  const { eventId } = roundFilter.parse(filter);
  return selectRounds(ctx)
    .where(and(eq(round.teamId, ctx.team.id), eventId ? eq(round.eventId, eventId) : undefined))
    .orderBy(desc(event.startsOn), asc(event.name), asc(round.position), asc(round.createdAt));
}

/** One round of the team. Throws NOT_FOUND. */
export async function getRound(ctx: ServerContext, roundId: string): Promise<RoundView> {
  requireCan(ctx, 'team:view');
  const [view] = await selectRounds(ctx).where(and(eq(round.id, roundId), eq(round.teamId, ctx.team.id)));
  if (!view) throw notFound('round');
  return view;
}

function selectRounds(ctx: ServerContext) {
  return ctx.db
    .select({
      id: round.id,
      eventId: round.eventId,
      name: round.name,
      position: round.position,
      lane: round.lane,
      plannedAt: round.plannedAt,
      createdAt: round.createdAt,
      eventName: event.name,
      trackId: track.id,
      trackName: track.name,
      timeZone: track.timeZone,
    })
    .from(round)
    .innerJoin(event, eq(event.id, round.eventId))
    .innerJoin(track, eq(track.id, event.trackId));
}
