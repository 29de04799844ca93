import { and, asc, eq, isNull } from 'drizzle-orm';
import { track } from '@/db/schema';
import { requireCan, type ServerContext } from '../context';
import { type TrackRow, teamTrack } from '../lookup';

export type TrackView = Omit<TrackRow, 'teamId'>;

export function trackView({ teamId: _team, ...view }: TrackRow): TrackView {
  return view;
}

/** The team's tracks by name; archived ones are left out. */
export async function listTracks(ctx: ServerContext): Promise<TrackView[]> {
  requireCan(ctx, 'team:view');
  const rows = await ctx.db
    .select()
    .from(track)
    .where(and(eq(track.teamId, ctx.team.id), isNull(track.archivedAt)))
    .orderBy(asc(track.name));
  return rows.map(trackView);
}

/** One track of the team, archived or not. Throws NOT_FOUND. */
export async function getTrack(ctx: ServerContext, trackId: string): Promise<TrackView> {
  requireCan(ctx, 'team:view');
  return trackView(await teamTrack(ctx, trackId));
}
