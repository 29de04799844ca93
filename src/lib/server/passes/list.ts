import { and, asc, count, desc, eq, gte, isNull, lte, type SQL, sql } from 'drizzle-orm';
import { event, pass, reading, round, track } from '@/db/schema';
import { type PassFilter, type PassSort, passFilter } from '@/lib/forms/pass';
import { requireCan, type ServerContext } from '../context';
import { notFound } from '../errors';
import { teamCar } from '../lookup';
import { sortedByDensityAltitude } from './density-order';
import { joinedPasses, successor } from './select';
import { type PassView, passView } from './view';

const USUAL_LIMIT = 200;

export interface PassPage {
  passes: PassView[];
  /** How many pass the filter, on all pages. */
  total: number;
  limit: number;
  offset: number;
}

// The sort key of a caller is looked up here and never becomes SQL itself.
const SORT_COLUMNS = {
  runAt: pass.runAt,
  passNo: pass.passNo,
  event: event.name,
  track: track.name,
  round: round.name,
  lane: pass.lane,
  slipPct: pass.slipPct,
  sixtyFtS: pass.sixtyFtS,
  eighthS: pass.eighthS,
  outcome: pass.outcome,
  runsOnDiscs: pass.runsOnDiscs,
  airTempC: reading.airTempC,
  trackTempC: reading.trackTempC,
  thousandFtS: pass.thousandFtS,
  quarterS: pass.quarterS,
} as const satisfies Record<ColumnSort, unknown>;

/** Density altitude is derived, never stored: it is sorted here and not by the database. */
type ColumnSort = Exclude<PassSort, 'densityAltitude'>;

/** The passes of a car as they stand, filtered and sorted; by default the newest first. */
export async function listPasses(ctx: ServerContext, raw: unknown): Promise<PassPage> {
  requireCan(ctx, 'pass:view');
  const filter = passFilter.parse(raw);
  await teamCar(ctx, filter.carId);
  const where = conditionsOfFilter(filter);
  const limit = filter.limit ?? USUAL_LIMIT;
  const offset = filter.offset ?? 0;
  if (filter.sort === 'densityAltitude') return byDensityAltitude(ctx, where, { dir: filter.dir, limit, offset });
  const rows = await joinedPasses(ctx.db, ctx.team.id, where)
    .orderBy(...ordering(filter.sort, filter.dir))
    .limit(limit)
    .offset(offset);
  return { passes: rows.map(passView), total: await totalOf(ctx, where), limit, offset };
}

interface Cut {
  dir: PassFilter['dir'];
  limit: number;
  offset: number;
}

async function byDensityAltitude(ctx: ServerContext, where: SQL | undefined, cut: Cut): Promise<PassPage> {
  const { dir, limit, offset } = cut;
  const rows = await joinedPasses(ctx.db, ctx.team.id, where).orderBy(...ordering('runAt', 'desc'));
  const passes = sortedByDensityAltitude(rows.map(passView), dir ?? 'asc').slice(offset, offset + limit);
  return { passes, total: rows.length, limit, offset };
}

function conditionsOfFilter(filter: PassFilter): SQL | undefined {
  const { carId, eventId, trackId, roundId, outcome, excluded, from, to } = filter;
  return and(
    eq(pass.carId, carId),
    isNull(successor.id),
    eventId ? eq(event.id, eventId) : undefined,
    trackId ? eq(track.id, trackId) : undefined,
    roundId ? eq(round.id, roundId) : undefined,
    outcome ? eq(pass.outcome, outcome) : undefined,
    excluded ? eq(pass.excluded, excluded === 'true') : undefined,
    from ? gte(pass.runAt, startOf(from)) : undefined,
    to ? lte(pass.runAt, endOf(to)) : undefined,
  );
}

const DATE_LENGTH = 'yyyy-mm-dd'.length;
const startOf = (moment: string): string => (moment.length === DATE_LENGTH ? `${moment}T00:00:00.000Z` : moment);
const endOf = (moment: string): string => (moment.length === DATE_LENGTH ? `${moment}T23:59:59.999Z` : moment);

/** What was not measured comes last either way. */
function ordering(sort: ColumnSort | null, dir: PassFilter['dir']): SQL[] {
  const direction = (dir ?? (sort ? 'asc' : 'desc')) === 'asc' ? asc : desc;
  const column = SORT_COLUMNS[sort ?? 'runAt'];
  return [sql`${column} is null`, direction(column), direction(pass.runAt), direction(pass.passNo), asc(pass.id)];
}

async function totalOf(ctx: ServerContext, where: SQL | undefined): Promise<number> {
  const [row] = await ctx.db
    .select({ total: count() })
    .from(pass)
    .innerJoin(round, eq(round.id, pass.roundId))
    .innerJoin(event, eq(event.id, round.eventId))
    .innerJoin(track, eq(track.id, event.trackId))
    .leftJoin(successor, eq(successor.correctsId, pass.id))
    .where(and(eq(pass.teamId, ctx.team.id), where));
  return row?.total ?? 0;
}

export interface PassWithHistory {
  pass: PassView;
  /** Every row of the pass, the first entry first. */
  history: PassView[];
}

/** A pass by the id of any of its rows: as it stands, with its history. Throws NOT_FOUND. */
export async function getPass(ctx: ServerContext, passId: string): Promise<PassWithHistory> {
  requireCan(ctx, 'pass:view');
  const [row] = await ctx.db
    .select({ rootId: pass.rootId })
    .from(pass)
    .where(and(eq(pass.id, passId), eq(pass.teamId, ctx.team.id)));
  if (!row) throw notFound('pass');
  const history = await passHistory(ctx, row.rootId);
  return { pass: history.find((one) => one.current) as PassView, history };
}

/** Every row of a pass, the first entry first. Throws NOT_FOUND. */
export async function passHistory(ctx: ServerContext, rootId: string): Promise<PassView[]> {
  requireCan(ctx, 'pass:view');
  const rows = (await joinedPasses(ctx.db, ctx.team.id, eq(pass.rootId, rootId))).map(passView);
  if (rows.length === 0) throw notFound('pass');
  return chainOrder(rows);
}

// Rows of one millisecond are told apart by what they correct, not by their time.
function chainOrder(rows: readonly PassView[]): PassView[] {
  const byCorrected = new Map(rows.map((row) => [row.correctsId, row]));
  const ordered: PassView[] = [];
  for (let row = byCorrected.get(null); row; row = byCorrected.get(row.id)) ordered.push(row);
  return ordered;
}
