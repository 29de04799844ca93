import { and, desc, eq } from 'drizzle-orm';
import { event, launchSheet, round, track, user } from '@/db/schema';
import { sheetFilter } from '@/lib/forms/sheet';
import { requireCan, type ServerContext } from '../context';
import { teamCar } from '../lookup';

export interface SheetSummary {
  id: string;
  version: number;
  decisionId: string;
  createdAt: string;
  roundName: string;
  eventName: string;
  timeZone: string;
  publishedByName: string;
}

/** Every launch sheet of a car, newest first; the first one is current. */
export async function listSheets(ctx: ServerContext, raw: unknown): Promise<SheetSummary[]> {
  requireCan(ctx, 'sheet:view');
  const { carId } = sheetFilter.parse(raw);
  await teamCar(ctx, carId);
  return ctx.db
    .select({
      id: launchSheet.id,
      version: launchSheet.version,
      decisionId: launchSheet.decisionId,
      createdAt: launchSheet.createdAt,
      roundName: round.name,
      eventName: event.name,
      timeZone: track.timeZone,
      publishedByName: user.name,
    })
    .from(launchSheet)
    .innerJoin(round, eq(round.id, launchSheet.roundId))
    .innerJoin(event, eq(event.id, round.eventId))
    .innerJoin(track, eq(track.id, event.trackId))
    .innerJoin(user, eq(user.id, launchSheet.publishedBy))
    .where(and(eq(launchSheet.teamId, ctx.team.id), eq(launchSheet.carId, carId)))
    .orderBy(desc(launchSheet.version));
}
