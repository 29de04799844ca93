import { and, eq } from 'drizzle-orm';
import { reading } from '@/db/schema';
import { readingFilter } from '@/lib/forms/reading';
import { requireCan, type ServerContext } from '../context';
import { notFound } from '../errors';
import { type Reader, type ReadingRow, teamReading, teamRound, teamTrack } from '../lookup';
import { type ReadingView, selectReadings } from './view';

const USUAL_LIMIT = 50;

/** The team's readings, newest first: those that stand, or with `all` the corrected ones too. */
export async function listReadings(ctx: ServerContext, raw: unknown = {}): Promise<ReadingView[]> {
  requireCan(ctx, 'reading:view');
  const { trackId, roundId, limit, all } = readingFilter.parse(raw);
  if (trackId) await teamTrack(ctx, trackId);
  if (roundId) await teamRound(ctx, roundId);
  const where = and(
    trackId ? eq(reading.trackId, trackId) : undefined,
    roundId ? eq(reading.roundId, roundId) : undefined,
  );
  return selectReadings(ctx, { where, currentOnly: all !== 'true', limit: limit ?? USUAL_LIMIT });
}

/** One reading of the team, corrected or not. Throws NOT_FOUND. */
export async function getReading(ctx: ServerContext, readingId: string): Promise<ReadingView> {
  requireCan(ctx, 'reading:view');
  const [view] = await selectReadings(ctx, { where: eq(reading.id, readingId), currentOnly: false, limit: 1 });
  if (!view) throw notFound('reading');
  return view;
}

/** The newest standing reading at a track; null when there is none. */
export async function latestReading(ctx: ServerContext, trackId: string): Promise<ReadingView | null> {
  const [view] = await listReadings(ctx, { trackId, limit: 1 });
  return view ?? null;
}

/** Follows corrections from a reading to the one that stands. Throws NOT_FOUND. */
export async function standingReading(ctx: ServerContext, readingId: string, db: Reader = ctx.db): Promise<ReadingRow> {
  let row = await teamReading(ctx, readingId, db);
  for (let next: ReadingRow | null = row; next; next = await correctionOf(ctx, next.id, db)) row = next;
  return row;
}

/** The correction of a reading, or null while it stands. */
export async function correctionOf(ctx: ServerContext, readingId: string, db: Reader): Promise<ReadingRow | null> {
  const [row] = await db
    .select()
    .from(reading)
    .where(and(eq(reading.teamId, ctx.team.id), eq(reading.correctsId, readingId)));
  return row ?? null;
}
