import { and, desc, eq, isNull, type SQL } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import { reading, round, track, user } from '@/db/schema';
import { type AirSummary, airSummary, conditionsFromReading, sunElevationDeg } from '@/lib/domain/air/conditions';
import type { Conditions } from '@/lib/domain/types';
import type { ServerContext } from '../context';
import type { Reader, ReadingRow } from '../lookup';

/** A reading as it was entered (SI) with what follows from it: derived each time, never stored. */
export interface ReadingView extends Omit<ReadingRow, 'teamId'> {
  trackName: string;
  roundName: string | null;
  enteredByName: string | null;
  /** The reading that corrected this one; null while it stands. */
  correctedById: string | null;
  conditions: Conditions;
  air: AirSummary;
  /** Apparent elevation of the sun, degrees; null without the position of the track. */
  sunElevationDeg: number | null;
}

export interface ReadingQuery {
  where: SQL | undefined;
  /** Leave out readings that have been corrected. */
  currentOnly: boolean;
  limit: number;
}

/** The team's readings, newest first. */
export async function selectReadings(
  ctx: ServerContext,
  query: ReadingQuery,
  db: Reader = ctx.db,
): Promise<ReadingView[]> {
  const successor = alias(reading, 'successor');
  const standing = query.currentOnly ? isNull(successor.id) : undefined;
  const rows = await db
    .select({ reading, track, roundName: round.name, enteredByName: user.name, correctedById: successor.id })
    .from(reading)
    .innerJoin(track, eq(track.id, reading.trackId))
    .leftJoin(round, eq(round.id, reading.roundId))
    .leftJoin(user, eq(user.id, reading.enteredBy))
    .leftJoin(successor, eq(successor.correctsId, reading.id))
    .where(and(eq(reading.teamId, ctx.team.id), query.where, standing))
    .orderBy(desc(reading.takenAt), desc(reading.createdAt))
    .limit(query.limit);
  return rows.map(toView);
}

interface Joined {
  reading: ReadingRow;
  track: typeof track.$inferSelect;
  roundName: string | null;
  enteredByName: string | null;
  correctedById: string | null;
}

function toView({ reading: { teamId: _team, ...row }, track: place, ...rest }: Joined): ReadingView {
  const conditions = conditionsFromReading(row);
  return {
    ...row,
    ...rest,
    trackName: place.name,
    conditions,
    air: airSummary(conditions),
    sunElevationDeg: sunElevationDeg(row.takenAt, place.latitudeDeg, place.longitudeDeg),
  };
}
