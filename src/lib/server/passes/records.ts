import { createHash } from 'node:crypto';
import { and, asc, eq, isNull } from 'drizzle-orm';
import { pass } from '@/db/schema';
import type { PassRecord } from '@/lib/domain/types';
import { requireCan, type ServerContext } from '../context';
import { type Reader, teamCar } from '../lookup';
import { type JoinedPass, joinedPasses, successor } from './select';
import { conditionsOf } from './view';

/**
 * The passes of a car as the model sees them, in the order they were run. `asOf` (UTC instant) gives them as they were known
 * then, so that a suggestion can be asked again with the passes it had.
 */
export async function loadPassRecords(
  ctx: ServerContext,
  carId: string,
  asOf: string | null = null,
  db: Reader = ctx.db,
): Promise<PassRecord[]> {
  requireCan(ctx, 'pass:view');
  await teamCar(ctx, carId, db);
  const standing = and(eq(pass.carId, carId), isNull(successor.id));
  const rows = await joinedPasses(db, ctx.team.id, standing, asOf).orderBy(
    asc(pass.runAt),
    asc(pass.passNo),
    asc(pass.id),
  );
  return rows.map(passRecord);
}

function passRecord({ pass: row, event, track, round, reading }: JoinedPass): PassRecord {
  return {
    id: row.rootId,
    passNo: row.passNo,
    event: eventLabel(event),
    track: track.name,
    time: row.runAt,
    round: round.name,
    lane: row.lane,
    conditions: conditionsOf(reading),
    settings: row.settings,
    runsOnDiscs: row.runsOnDiscs,
    slipPct: row.slipPct,
    slipSdPct: row.slipSdPct,
    sixtyFtS: row.sixtyFtS,
    outcome: row.outcome,
    excluded: row.excluded,
  };
}

/** An event of the same name comes back every year: the model must not take them for one. */
export function eventLabel({ name, startsOn }: { name: string; startsOn: string }): string {
  const year = startsOn.slice(0, 4);
  return name.includes(year) ? name : `${name} ${year}`;
}

/** SHA-256 (hex) over the passes and their values: names exactly what the model had seen. Key order does not matter. */
export function trainingHash(records: readonly PassRecord[]): string {
  return createHash('sha256').update(canonicalJson(records)).digest('hex');
}

function canonicalJson(value: unknown): string {
  return JSON.stringify(value, (_key, inner: unknown) => (isPlainObject(inner) ? sortedByKey(inner) : inner));
}

const isPlainObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

const sortedByKey = (object: Record<string, unknown>): Record<string, unknown> =>
  Object.fromEntries(Object.entries(object).sort(([a], [b]) => (a < b ? -1 : 1)));
