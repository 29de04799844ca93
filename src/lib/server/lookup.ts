import { and, asc, eq, isNull } from 'drizzle-orm';
import type { Db } from '@/db/client';
import { adjustable, car, event, reading, round, track } from '@/db/schema';
import type { Adjustable } from '@/lib/domain/types';
import type { ServerContext } from './context';
import { notFound } from './errors';

/** Loads what other verbs point at. A missing row and another team's row are the same 404. */

export type Reader = Pick<Db, 'select'>;
export type CarRow = typeof car.$inferSelect;
export type TrackRow = typeof track.$inferSelect;
export type ReadingRow = typeof reading.$inferSelect;
export interface RoundPlace {
  round: typeof round.$inferSelect;
  event: typeof event.$inferSelect;
  track: TrackRow;
}

export async function teamCar(ctx: ServerContext, carId: string, db: Reader = ctx.db): Promise<CarRow> {
  const [row] = await db
    .select()
    .from(car)
    .where(and(eq(car.id, carId), eq(car.teamId, ctx.team.id)));
  if (!row) throw notFound('car');
  return row;
}

export async function teamTrack(ctx: ServerContext, trackId: string, db: Reader = ctx.db): Promise<TrackRow> {
  const [row] = await db
    .select()
    .from(track)
    .where(and(eq(track.id, trackId), eq(track.teamId, ctx.team.id)));
  if (!row) throw notFound('track');
  return row;
}

/** A round with its event and track. */
export async function teamRound(ctx: ServerContext, roundId: string, db: Reader = ctx.db): Promise<RoundPlace> {
  const [row] = await db
    .select({ round, event, track })
    .from(round)
    .innerJoin(event, eq(event.id, round.eventId))
    .innerJoin(track, eq(track.id, event.trackId))
    .where(and(eq(round.id, roundId), eq(round.teamId, ctx.team.id)));
  if (!row) throw notFound('round');
  return row;
}

export async function teamReading(ctx: ServerContext, readingId: string, db: Reader = ctx.db): Promise<ReadingRow> {
  const [row] = await db
    .select()
    .from(reading)
    .where(and(eq(reading.id, readingId), eq(reading.teamId, ctx.team.id)));
  if (!row) throw notFound('reading');
  return row;
}

/** What can be set on the car today, in the team's order. */
export async function activeAdjustables(ctx: ServerContext, carId: string, db: Reader = ctx.db): Promise<Adjustable[]> {
  const rows = await db
    .select()
    .from(adjustable)
    .where(and(eq(adjustable.carId, carId), eq(adjustable.teamId, ctx.team.id), isNull(adjustable.archivedAt)))
    .orderBy(asc(adjustable.position), asc(adjustable.key));
  return rows.map(toAdjustable);
}

export function toAdjustable(row: typeof adjustable.$inferSelect): Adjustable {
  const { key, label, unit, step, low, high, minutes, group, movable, beliefMeanPct, beliefSdPct } = row;
  const belief = beliefMeanPct === null || beliefSdPct === null ? null : { meanPct: beliefMeanPct, sdPct: beliefSdPct };
  return { key, label, unit, step, low, high, minutes, group, movable, belief };
}
