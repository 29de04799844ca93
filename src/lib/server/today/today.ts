import { and, asc, count, eq, gte } from 'drizzle-orm';
import { car, pass, round, track } from '@/db/schema';
import { can } from '@/lib/domain/permissions';
import { requireCan, type ServerContext } from '../context';
import { listReadings, type ReadingView } from '../readings';
import { getRound, type RoundView } from '../rounds';
import { listTracks } from '../tracks';
import { type CarState, carStates } from './car-state';

export interface Today {
  /** The instant this view was made, so that ages on it agree. */
  now: Date;
  /** The clock to show times in: the next round's track, else the reading's, else any of the team's. */
  zone: string;
  /** The soonest planned round that is not long past; null when none is planned. */
  round: RoundView | null;
  /** The freshest standing reading not dated ahead, of the round's track when a round is planned. */
  reading: ReadingView | null;
  cars: CarState[];
  /** How much the team has entered, for the first steps. */
  have: { cars: number; tracks: number; rounds: number; passes: number };
}

/** A round may run late: it stays "next" this long after its planned time. */
const LATE_MS = 30 * 60_000;
/** A reading dated ahead is not of now; a clock may run this much ahead. */
const CLOCK_SLACK_MS = 5 * 60_000;
const LOOK_BACK = 20;

/** What a member sees on coming in: the next round, how old the reading is, how far the plan has come. */
export async function getToday(ctx: ServerContext): Promise<Today> {
  requireCan(ctx, 'team:view');
  const now = ctx.now();
  const next = await nextRound(ctx, now);
  const [reading, cars, have] = await Promise.all([
    freshestReading(ctx, next, now),
    carStates(ctx, next?.id ?? null),
    counts(ctx),
  ]);
  return { now, zone: await clockZone(ctx, next, reading), round: next, reading, cars, have };
}

async function nextRound(ctx: ServerContext, now: Date): Promise<RoundView | null> {
  const [row] = await ctx.db
    .select({ id: round.id })
    .from(round)
    .where(and(eq(round.teamId, ctx.team.id), gte(round.plannedAt, new Date(now.getTime() - LATE_MS).toISOString())))
    .orderBy(asc(round.plannedAt))
    .limit(1);
  return row ? getRound(ctx, row.id) : null;
}

async function freshestReading(ctx: ServerContext, next: RoundView | null, now: Date): Promise<ReadingView | null> {
  if (!can(ctx.role, 'reading:view')) return null;
  const newest = await listReadings(ctx, { limit: LOOK_BACK, ...(next ? { trackId: next.trackId } : {}) });
  const latest = new Date(now.getTime() + CLOCK_SLACK_MS).toISOString();
  return newest.find((one) => one.takenAt <= latest) ?? newest[0] ?? null;
}

async function clockZone(ctx: ServerContext, next: RoundView | null, reading: ReadingView | null): Promise<string> {
  if (next) return next.timeZone;
  const tracks = await listTracks(ctx);
  const here = tracks.find((one) => one.id === reading?.trackId) ?? tracks[0];
  return here?.timeZone ?? 'UTC';
}

async function counts(ctx: ServerContext): Promise<Today['have']> {
  const [cars, tracks, rounds, passes] = await Promise.all(
    [car, track, round, pass].map((table) => countOf(ctx, table)),
  );
  return { cars: cars ?? 0, tracks: tracks ?? 0, rounds: rounds ?? 0, passes: passes ?? 0 };
}

async function countOf(
  ctx: ServerContext,
  table: typeof car | typeof track | typeof round | typeof pass,
): Promise<number> {
  const [row] = await ctx.db.select({ n: count() }).from(table).where(eq(table.teamId, ctx.team.id));
  return row?.n ?? 0;
}
