import { and, desc, eq } from 'drizzle-orm';
import { event, track } from '@/db/schema';
import { requireCan, type ServerContext } from '../context';
import { notFound } from '../errors';

export type EventView = Omit<typeof event.$inferSelect, 'teamId'> & { trackName: string; timeZone: string };

/** The team's events, newest first, each with its track's name and zone. */
export async function listEvents(ctx: ServerContext): Promise<EventView[]> {
  requireCan(ctx, 'team:view');
  return selectEvents(ctx).where(eq(event.teamId, ctx.team.id)).orderBy(desc(event.startsOn), desc(event.createdAt));
}

/** One event of the team. Throws NOT_FOUND. */
export async function getEvent(ctx: ServerContext, eventId: string): Promise<EventView> {
  requireCan(ctx, 'team:view');
  const [view] = await selectEvents(ctx).where(and(eq(event.id, eventId), eq(event.teamId, ctx.team.id)));
  if (!view) throw notFound('event');
  return view;
}

function selectEvents(ctx: ServerContext) {
  return ctx.db
    .select({
      id: event.id,
      trackId: event.trackId,
      name: event.name,
      startsOn: event.startsOn,
      endsOn: event.endsOn,
      createdAt: event.createdAt,
      trackName: track.name,
      timeZone: track.timeZone,
    })
    .from(event)
    .innerJoin(track, eq(track.id, event.trackId));
}
