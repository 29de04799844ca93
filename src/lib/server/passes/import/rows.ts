import { randomUUID } from 'node:crypto';
import type { pass, reading } from '@/db/schema';
import type { PassCsvRow } from '@/lib/pass-csv';
import type { ServerContext } from '../../context';
import type { RowPlace } from './places';

export type NewReading = typeof reading.$inferInsert;
export type NewPass = typeof pass.$inferInsert;

export interface NewRun {
  pass: NewPass;
  /** Null when the row has no conditions at all. */
  reading: NewReading | null;
}

interface Making {
  ctx: ServerContext;
  carId: string;
  createdAt: string;
}

/** The rows to store for one row of a file. */
export function newRun(making: Making, row: PassCsvRow, place: RowPlace): NewRun {
  const reading = hasConditions(row) ? newReading(making, row, place) : null;
  return { reading, pass: newPass(making, row, place, reading?.id ?? null) };
}

const CONDITIONS = [
  'airTempC',
  'relativeHumidity',
  'dewPointC',
  'wetBulbC',
  'pressurePa',
  'trackTempC',
  'windMps',
  'windDirDeg',
] as const;

const hasConditions = (row: PassCsvRow): boolean => CONDITIONS.some((name) => row[name] !== null);

function newReading({ ctx, createdAt }: Making, row: PassCsvRow, { track, round }: RowPlace): NewReading {
  return {
    id: randomUUID(),
    teamId: ctx.team.id,
    trackId: track.id,
    roundId: round.id,
    takenAt: row.time,
    ...Object.fromEntries(CONDITIONS.map((name) => [name, row[name]])),
    pressureKind: row.pressureKind,
    altitudeM: row.altitudeM ?? track.altitudeM,
    source: 'file',
    enteredBy: ctx.user.id,
    createdAt,
  };
}

function newPass(
  { ctx, carId, createdAt }: Making,
  row: PassCsvRow,
  place: RowPlace,
  readingId: string | null,
): NewPass {
  const id = randomUUID();
  return {
    id,
    rootId: id,
    teamId: ctx.team.id,
    carId,
    roundId: place.round.id,
    readingId,
    passNo: row.passNo,
    runAt: row.time,
    lane: row.lane,
    settings: { ...row.settings },
    runsOnDiscs: row.runsOnDiscs,
    slipPct: row.slipPct,
    slipSource: row.slipPct === null ? null : 'measured',
    sixtyFtS: row.sixtyFtS,
    threeThirtyFtS: row.threeThirtyFtS,
    eighthS: row.eighthS,
    eighthMps: row.eighthMps,
    thousandFtS: row.thousandFtS,
    quarterS: row.quarterS,
    quarterMps: row.quarterMps,
    outcome: row.outcome,
    excluded: row.excluded,
    excludedReason: row.excludedReason || null,
    notes: row.notes,
    source: 'file',
    enteredBy: ctx.user.id,
    createdAt,
  };
}
