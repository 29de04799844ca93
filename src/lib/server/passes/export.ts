import { and, asc, eq, isNull } from 'drizzle-orm';
import { adjustable, pass } from '@/db/schema';
import type { Adjustable } from '@/lib/domain/types';
import { passExport } from '@/lib/forms/pass';
import { exportPassCsv, type PassCsvData } from '@/lib/pass-csv';
import { requireCan, type ServerContext } from '../context';
import { type CarRow, teamCar, toAdjustable } from '../lookup';
import { utcOffsetAt } from './import/zone';
import { type JoinedPass, joinedPasses, successor } from './select';

export interface PassFileExport {
  /** Made of the car's name by us: letters, digits and dashes only. */
  fileName: string;
  csv: string;
}

/** The passes of a car as they stand, in the order they were run, as a file that import reads back. */
export async function exportPasses(ctx: ServerContext, raw: unknown): Promise<PassFileExport> {
  requireCan(ctx, 'pass:export');
  const { carId, units } = passExport.parse(raw);
  const car = await teamCar(ctx, carId);
  const standing = and(eq(pass.carId, carId), isNull(successor.id));
  const joined = await joinedPasses(ctx.db, ctx.team.id, standing).orderBy(
    asc(pass.runAt),
    asc(pass.passNo),
    asc(pass.id),
  );
  const rows = joined.map(csvData);
  return {
    fileName: fileName(car),
    csv: exportPassCsv(rows, await columnsOf(ctx, carId, rows), units ?? ctx.team.units),
  };
}

/** What can be set on the car today, and what was once set on a pass. */
async function columnsOf(ctx: ServerContext, carId: string, rows: readonly PassCsvData[]): Promise<Adjustable[]> {
  const used = new Set(rows.flatMap((row) => Object.keys(row.settings)));
  const all = await ctx.db
    .select()
    .from(adjustable)
    .where(and(eq(adjustable.carId, carId), eq(adjustable.teamId, ctx.team.id)))
    .orderBy(asc(adjustable.position), asc(adjustable.key));
  return all.filter((row) => row.archivedAt === null || used.has(row.key)).map(toAdjustable);
}

function csvData({ pass: row, event, track, round, reading }: JoinedPass): PassCsvData {
  return {
    ...row,
    event: event.name,
    track: track.name,
    round: round.name,
    time: row.runAt,
    utcOffset: utcOffsetAt(track.timeZone, row.runAt),
    airTempC: reading?.airTempC ?? null,
    relativeHumidity: reading?.relativeHumidity ?? null,
    dewPointC: reading?.dewPointC ?? null,
    wetBulbC: reading?.wetBulbC ?? null,
    pressurePa: reading?.pressurePa ?? null,
    pressureKind: reading?.pressureKind ?? null,
    altitudeM: reading?.altitudeM ?? track.altitudeM,
    trackTempC: reading?.trackTempC ?? null,
    windMps: reading?.windMps ?? null,
    windDirDeg: reading?.windDirDeg ?? null,
    excludedReason: row.excludedReason ?? '',
  };
}

function fileName(car: CarRow): string {
  const slug = car.name
    .normalize('NFKD')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '');
  return `passes-${slug.slice(0, 40) || 'car'}.csv`;
}
