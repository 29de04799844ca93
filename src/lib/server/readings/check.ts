import { and, desc, eq, isNull, lte, ne, or } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import { reading } from '@/db/schema';
import { mustRefuse, type ReadingCheck, readingChecks } from '@/lib/domain/air/plausibility';
import type { ServerContext } from '../context';
import { validationError } from '../errors';
import type { ReadingRow, TrackRow } from '../lookup';
import type { NewReading } from './rows';

export interface ReadingWarning {
  field: string;
  message: string;
}

/** What looks wrong about a reading that may be stored. Throws VALIDATION naming every field that cannot be. */
export async function checkReading(ctx: ServerContext, row: NewReading, track: TrackRow): Promise<ReadingWarning[]> {
  const checks = readingChecks(measured(row), {
    altitudeM: track.altitudeM,
    latitudeDeg: track.latitudeDeg,
    longitudeDeg: track.longitudeDeg,
    takenAt: row.takenAt,
    previous: await previousReading(ctx, row),
    units: ctx.team.units,
  });
  if (mustRefuse(checks)) throw refusal(checks);
  return checks.map(({ field, message }) => ({ field, message }));
}

function refusal(checks: readonly ReadingCheck[]) {
  const impossible = checks.filter((check) => check.level === 'impossible');
  const fields = Object.fromEntries(impossible.map(({ field, message }) => [field, message]));
  return validationError(impossible.map(({ message }) => message).join(' '), fields);
}

function measured(row: NewReading) {
  return {
    airTempC: row.airTempC ?? null,
    relativeHumidity: row.relativeHumidity ?? null,
    dewPointC: row.dewPointC ?? null,
    wetBulbC: row.wetBulbC ?? null,
    pressurePa: row.pressurePa ?? null,
    pressureKind: row.pressureKind ?? null,
    altitudeM: row.altitudeM ?? null,
    trackTempC: row.trackTempC ?? null,
  };
}

/** The standing reading before this one at the same track; neither the reading it corrects nor its own first copy. */
async function previousReading(ctx: ServerContext, row: NewReading): Promise<ReadingRow | null> {
  const successor = alias(reading, 'successor');
  const [found] = await ctx.db
    .select({ reading })
    .from(reading)
    .leftJoin(successor, eq(successor.correctsId, reading.id))
    .where(
      and(
        eq(reading.teamId, ctx.team.id),
        eq(reading.trackId, row.trackId),
        lte(reading.takenAt, row.takenAt),
        isNull(successor.id),
        row.correctsId ? ne(reading.id, row.correctsId) : undefined,
        row.clientId ? or(isNull(reading.clientId), ne(reading.clientId, row.clientId)) : undefined,
      ),
    )
    .orderBy(desc(reading.takenAt), desc(reading.createdAt))
    .limit(1);
  return found?.reading ?? null;
}
